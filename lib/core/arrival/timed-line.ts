import type { SharedShift } from "./estimate.ts";
import type { Reading } from "./reading.ts";
import { robustLine, type LineColumns, type RobustLine } from "./robust-line.ts";
import { timedExcess, type TimedWindow } from "./timed-correction.ts";

export interface CorrectedLine {
  readonly line: RobustLine;
  /** Half the change between one sigma less and more of the correction; null where no reading is `timed`. */
  readonly shift: SharedShift | null;
  readonly excess: number;
}

/**
 * The line of readings, those that were `timed` at a moment first stretched about their mean frequency, which stands for
 * the swell's peak. Times count from `zeroEpochSeconds`. Null where no line is determined.
 */
export function correctedLine(readings: readonly Reading[], zeroEpochSeconds: number, window: TimedWindow): CorrectedLine | null {
  const lineOf = (some: readonly Reading[], stretch: Stretch | null): RobustLine | null => robustLine(columnsOf(some, zeroEpochSeconds, stretch));
  const timed = readings.filter((reading) => reading.kind === "timed");
  const apparent = (timed.length > 0 ? lineOf(timed, null) : null) ?? lineOf(readings, null);
  if (apparent === null) return null;
  if (timed.length === 0) return { line: apparent, shift: null, excess: 0 };

  const metresPerSlope = window.gravity / (4 * Math.PI);
  const { excess, excessLow, excessHigh } = timedExcess(apparent.york.slope * metresPerSlope, window);
  const pivotHz = timed.reduce((sum, reading) => sum + reading.frequencyHz, 0) / timed.length;
  const at = (value: number): RobustLine | null => lineOf(readings, { pivotHz, factor: 1 + value });
  const [line, low, high] = [at(excess), at(excessLow)?.york, at(excessHigh)?.york];
  if (!line || !low || !high) return null;
  const distanceMetres = ((low.slope - high.slope) / 2) * metresPerSlope;
  return { line, shift: { cause: "timed-readings", distanceMetres, originSeconds: (low.intercept - high.intercept) / 2 }, excess };
}

interface Stretch {
  readonly pivotHz: number;
  readonly factor: number;
}

function columnsOf(readings: readonly Reading[], zeroEpochSeconds: number, stretch: Stretch | null): LineColumns {
  const factorOf = (reading: Reading): number => (stretch && reading.kind === "timed" ? stretch.factor : 1);
  const pivotHz = stretch?.pivotHz ?? 0;
  return {
    frequency: Float64Array.from(readings, (reading) => pivotHz + (reading.frequencyHz - pivotHz) * factorOf(reading)),
    frequencySigma: Float64Array.from(readings, (reading) => reading.frequencySigmaHz * factorOf(reading)),
    time: Float64Array.from(readings, (reading) => reading.arrivalEpochSeconds - zeroEpochSeconds),
    timeSigma: Float64Array.from(readings, (reading) => reading.arrivalSigmaSeconds),
  };
}
