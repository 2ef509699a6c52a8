import type { LineOutcome } from "../arrival/line.ts";
import type { Position } from "../units/position.ts";
import type { AnswerWarning, SourceAnswer } from "./answer.ts";

export interface StationSolution {
  readonly id: string;
  readonly name: string;
  readonly position: Position;
  readonly outcome: LineOutcome;
}

/** One event worked out from its observations: each station's line, and where they place the storm. */
export interface EventSolution {
  /** In the order in which the stations first appear among the deployments; only those with readings or an estimate. */
  readonly stations: readonly StationSolution[];
  /** Verdicts in the order of those `stations` that have a line or an estimate. Null where none has. */
  readonly answer: SourceAnswer | null;
  readonly warnings: readonly AnswerWarning[];
}
