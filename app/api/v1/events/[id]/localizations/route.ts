import { keepLocalization } from "#lib/application/keep-localization.ts";
import { localizationJson, localizationRequest } from "#lib/contracts/api/localizations.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.listLocalizations, async ({ params: { id = "" }, program }) => {
  const { events, localizations } = program;
  if ((await events.loadEvent(id)) === null) throw new Refusal("not-found", `No event "${id}" is stored.`);
  return { body: { localizations: (await localizations.listLocalizations(id)).map(localizationJson) } };
});

export const POST = route(OPERATIONS.keepLocalization, async ({ params: { id = "" }, body, program, doing }) => {
  const { number, answer } = await keepLocalization(program, { ...localizationRequest(body), eventId: id, ...doing });
  return { body: { number, answer }, location: `/api/v1/events/${encodeURIComponent(id)}/localizations/${number}` };
});
