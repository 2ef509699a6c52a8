import type { SharedShift } from "../arrival/estimate.ts";
import type { DispersionLine } from "../arrival/line.ts";
import { studentTQuantile } from "../statistics/student-t.ts";

/** Probability below one standard deviation above the mean of a Gaussian. */
const ONE_SIGMA = 0.841344746;

/**
 * The line with its covariance widened so that one sigma of a Gaussian covers what one sigma of Student's t does.
 * It applies where the readings' own scatter, known from few of them, set the covariance; stated errors are taken
 * as known, and so are shifts that stations share.
 */
export function widenedForScatter(line: DispersionLine): DispersionLine {
  if (line.reducedChiSquare === null || line.reducedChiSquare <= 1) return line;
  const factor = studentTQuantile(ONE_SIGMA, line.degreesOfFreedom) ** 2;
  const widened = (whole: number, shared: number): number => (whole - shared) * factor + shared;
  const sharedOf = (product: (shift: SharedShift) => number): number => line.sharedShifts.reduce((sum, shift) => sum + product(shift), 0);
  const { distanceVariance, originVariance, distanceOriginCovariance } = line.covariance;
  return {
    ...line,
    covariance: {
      distanceVariance: widened(distanceVariance, sharedOf((shift) => shift.distanceMetres ** 2)),
      originVariance: widened(originVariance, sharedOf((shift) => shift.originSeconds ** 2)),
      distanceOriginCovariance: widened(distanceOriginCovariance, sharedOf((shift) => shift.distanceMetres * shift.originSeconds)),
    },
  };
}
