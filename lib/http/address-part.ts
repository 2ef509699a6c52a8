import { Refusal } from "#lib/core/failures/refusal.ts";

/** Spaces and letters beyond ASCII stand in an address as per cent signs and digits; null where those mean no text. */
export function decodedPart(written: string): string | null {
  try {
    return decodeURIComponent(written);
  } catch {
    return null;
  }
}

/** @throws Refusal `not-found` where a part that should be a number is none: nothing has such a name. */
export function numberPart(params: Readonly<Record<string, string>>, name: string, what: string): number {
  const written = params[name] ?? "";
  if (!/^\d{1,9}$/.test(written)) throw new Refusal("not-found", `No ${what} "${written}" is stored.`);
  return Number(written);
}
