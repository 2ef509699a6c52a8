import type { ArrivalEstimate } from "./estimate.ts";

/** The straight line t = t0 + s f of one station's readings, and what it says of the storm. */
export interface DispersionLine extends ArrivalEstimate {
  readonly readingsUsed: number;
  /** Rows of the readings whose weight the robust fit lowered. */
  readonly downweightedRows: readonly number[];
  /** Null for two readings, which any line fits. */
  readonly reducedChiSquare: number | null;
  readonly pValue: number | null;
  readonly effectiveReadings: number;
  /** Student's t, for intervals of the distance and the time. */
  readonly degreesOfFreedom: number;
  readonly meanFrequencyHz: number;
  readonly shelfCorrected: boolean;
  readonly notes: readonly LineNote[];
}

/** Something about a station's readings that people should know; the host puts the station's id before it. */
export interface LineNote {
  readonly code: string;
  readonly message: string;
}

/** A line, or why there is none: an outcome, never an exception. */
export type LineOutcome =
  | { readonly kind: "fitted"; readonly line: DispersionLine }
  | { readonly kind: "sent-in"; readonly estimate: ArrivalEstimate }
  | { readonly kind: "refused"; readonly code: LineRefusal; readonly message: string };

export type LineRefusal = "too-few-readings" | "period-rises" | "slope-undetermined" | "beyond-half-girth" | "conflicting-input";
