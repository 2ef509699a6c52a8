import { localizationChanges } from "#lib/application/localization-changes.ts";
import type { StoredLocalization } from "#lib/application/ports.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.compareLocalizations, async ({ params: { id = "", number = "" }, query: { since }, program }) => {
  const load = async (written: string): Promise<StoredLocalization> => {
    const kept = /^\d{1,9}$/.test(written) ? await program.localizations.loadLocalization(id, Number(written)) : null;
    if (kept === null) throw new Refusal("not-found", `Event "${id}" has no localization ${written}.`);
    return kept;
  };
  const [before, after] = [await load(since), await load(number)];
  return { body: localizationChanges(before, after) };
});
