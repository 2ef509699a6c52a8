import { keepLocalization } from "#lib/application/keep-localization.ts";
import { localizationJson, readLocalizationRequest } from "#lib/contracts/localization-json.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { decodedPart } from "#lib/http/address-part.ts";
import { answerRequest, readJson } from "#lib/http/answer-request.ts";
import { runningProgram } from "#lib/http/running-program.ts";

interface EventAddress {
  readonly params: Promise<{ id: string }>;
}

/** Until there are accounts, whoever reaches this server is its keeper. */
const LOCAL_KEEPER = "local keeper";

export function GET(request: Request, { params }: EventAddress): Promise<Response> {
  return answerRequest(request, async () => {
    const id = decodedPart((await params).id) ?? "";
    const { events, localizations } = await runningProgram();
    if ((await events.loadEvent(id)) === null) throw new Refusal("not-found", `No event "${id}" is stored.`);
    const list = await localizations.listLocalizations(id);
    return { status: 200, body: { localizations: list.map(localizationJson) } };
  });
}

export function POST(request: Request, { params }: EventAddress): Promise<Response> {
  return answerRequest(request, async () => {
    const { id } = await params;
    const wanted = readLocalizationRequest(await readJson(request));
    const { events, localizations, host } = await runningProgram();
    const { number, answer } = await keepLocalization({ events, localizations, host }, {
      ...wanted,
      eventId: decodedPart(id) ?? "",
      actor: LOCAL_KEEPER,
      savedEpochSeconds: Date.now() / 1000,
    });
    return { status: 201, body: { number, answer }, location: `/api/v1/events/${id}/localizations/${number}` };
  });
}
