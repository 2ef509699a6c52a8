import { chiSquareSurvival } from "../statistics/chi-square.ts";
import { effectiveReadings } from "./effective-readings.ts";
import type { RobustLine } from "./robust-line.ts";

export interface LineScatter {
  /** Factor on the covariance that the stated errors alone ask for; 1 or more. */
  readonly inflation: number;
  readonly effective: number;
  /** Null for two readings, which any line fits. */
  readonly reducedChiSquare: number | null;
  readonly pValue: number | null;
}

/** How readings scatter about their line, and by how much that widens it. */
export function scatterOf(line: RobustLine): LineScatter {
  const n = line.residuals.length;
  if (n === 2) return { inflation: 1, effective: 2, reducedChiSquare: null, pValue: null };
  let chiSquare = 0;
  line.residuals.forEach((residual, i) => (chiSquare += (line.weights[i] ?? 1) * residual ** 2));
  const reducedChiSquare = chiSquare / (n - 2);
  const effective = effectiveReadings(Array.from(line.residuals, (residual, i) => residual * Math.sqrt(line.weights[i] ?? 1)));
  return {
    inflation: (n / effective) * Math.max(1, reducedChiSquare),
    effective,
    reducedChiSquare,
    pValue: chiSquareSurvival(chiSquare, n - 2),
  };
}
