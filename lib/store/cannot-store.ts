import { Refusal } from "#lib/core/failures/refusal.ts";

/** What the database says of the place that it writes to, and what that means for whoever wanted something stored. */
const REASONS: readonly { readonly said: RegExp; readonly sentence: string }[] = [
  { said: /database or disk is full|SQLITE_FULL/i, sentence: "The server's disk is full." },
  { said: /readonly database|SQLITE_READONLY/i, sentence: "The server may not write to its data folder any more." },
  { said: /disk I\/O error|SQLITE_IOERR/i, sentence: "The server's disk does not answer as it should." },
];

/** A fault of the place where the data stand, as a refusal that says so; anything else as it is. */
export function asRefusal(error: unknown): unknown {
  const said = saying(error);
  const reason = REASONS.find((candidate) => candidate.said.test(said));
  return reason === undefined ? error : new Refusal("cannot-store", `${reason.sentence} Nothing of this was stored; what was stored before is still there.`);
}

/** A message with those of its causes: the client of the database wraps what the driver says. */
function saying(error: unknown): string {
  if (!(error instanceof Error)) return JSON.stringify([error]);
  return `${error.message} ${error.cause === undefined ? "" : saying(error.cause)}`;
}
