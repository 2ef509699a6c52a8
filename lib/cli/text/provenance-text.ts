import type { Provenance } from "#lib/contracts/fit-json.ts";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";

/** The settings that differ from the defaults, and the program and digest by which the answer can be made again. */
export function provenanceText({ program, inputDigest, settings }: Provenance): string[] {
  const changed = differences("", DEFAULT_PUBLIC_SETTINGS, settings);
  return [`Settings: ${changed.length === 0 ? "the defaults" : changed.join(", ")}.`, `${program}, input ${inputDigest}.`];
}

function differences(prefix: string, before: object, after: object): string[] {
  const was: ReadonlyMap<string, unknown> = new Map(Object.entries(before));
  return Object.entries(after).flatMap(([key, now]: [string, unknown]) => {
    const old = was.get(key);
    if (typeof now === "object" && now !== null && typeof old === "object" && old !== null) return differences(`${prefix}${key}.`, old, now);
    return now === old ? [] : [`${prefix}${key} ${String(now)}`];
  });
}
