import { localizationJson } from "#lib/contracts/api/localizations.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.readLocalization, async ({ params: { id = "", number = "" }, program }) => {
  const kept = /^\d{1,9}$/.test(number) ? await program.localizations.loadLocalization(id, Number(number)) : null;
  if (kept === null) throw new Refusal("not-found", `Event "${id}" has no localization ${number}.`);
  const { settingsJson, inputJson, answerJson } = kept;
  const copies = { settings: JSON.parse(settingsJson) as unknown, input: JSON.parse(inputJson) as unknown, answer: JSON.parse(answerJson) as unknown };
  return { body: { ...localizationJson(kept), ...copies } };
});
