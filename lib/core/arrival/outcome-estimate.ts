import type { ArrivalEstimate } from "./estimate.ts";
import type { LineOutcome } from "./line.ts";

/** What a station says, whether its line was fitted here or its estimate sent in; null where it was refused. */
export function outcomeEstimate(outcome: LineOutcome): ArrivalEstimate | null {
  if (outcome.kind === "fitted") return outcome.line;
  return outcome.kind === "sent-in" ? outcome.estimate : null;
}
