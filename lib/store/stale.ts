import { Refusal } from "#lib/core/failures/refusal.ts";

/** @throws Refusal `conflict` where something was changed since the revision that its editor had seen. */
export function requireRevision(what: string, stored: { readonly revision: number }, startedFrom: number): void {
  if (stored.revision === startedFrom) return;
  throw new Refusal("conflict", `${what} was changed meanwhile: it is at revision ${stored.revision}, and this change started from revision ${startedFrom}.`);
}
