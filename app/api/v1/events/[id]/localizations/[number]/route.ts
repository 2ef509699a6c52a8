import { localizationJson } from "#lib/contracts/localization-json.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { decodedPart } from "#lib/http/address-part.ts";
import { answerRequest } from "#lib/http/answer-request.ts";
import { runningProgram } from "#lib/http/running-program.ts";

interface LocalizationAddress {
  readonly params: Promise<{ id: string; number: string }>;
}

export function GET(request: Request, { params }: LocalizationAddress): Promise<Response> {
  return answerRequest(request, async () => {
    const { id, number } = await params;
    const { localizations } = await runningProgram();
    const eventId = decodedPart(id) ?? "";
    const kept = /^\d{1,9}$/.test(number) ? await localizations.loadLocalization(eventId, Number(number)) : null;
    if (kept === null) throw new Refusal("not-found", `Event "${eventId}" has no localization ${number}.`);
    const { settingsJson, inputJson, answerJson } = kept;
    const copies = { settings: JSON.parse(settingsJson) as unknown, input: JSON.parse(inputJson) as unknown, answer: JSON.parse(answerJson) as unknown };
    return { status: 200, body: { ...localizationJson(kept), ...copies } };
  });
}
