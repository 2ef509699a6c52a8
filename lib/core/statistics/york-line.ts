import { centredPoints, mean, requireYorkPoints, xDiffers, type CentredPoint, type YorkPoints } from "./york-points.ts";

export interface YorkLine {
  readonly intercept: number;
  readonly slope: number;
  /** Variances as the given standard deviations alone ask for: not scaled by the scatter. */
  readonly interceptVariance: number;
  readonly slopeVariance: number;
  readonly interceptSlopeCovariance: number;
  /** Weighted sum of squared residuals at the minimum; n - 2 degrees of freedom. */
  readonly chiSquare: number;
  /** False where no line is determined (all x alike) or the iteration did not settle; every number is then NaN. */
  readonly converged: boolean;
}

const NO_LINE: YorkLine = {
  intercept: NaN,
  slope: NaN,
  interceptVariance: NaN,
  slopeVariance: NaN,
  interceptSlopeCovariance: NaN,
  chiSquare: NaN,
  converged: false,
};

const MOST_ITERATIONS = 200;

/**
 * The straight line y = a + b x through points with errors in both coordinates, by the unified equations of York et
 * al. with no correlation between a point's two errors. [source: york-2004] With all `xSigma` zero it is weighted
 * least squares of y on x, exactly.
 *   (1)  W_i = w_i / (sy_i^2 + b^2 sx_i^2)                         weight along the line's normal
 *   (2)  U_i = x_i - X, V_i = y_i - Y                              X, Y means weighted by W
 *   (3)  beta_i = (U_i sy_i^2 + b V_i sx_i^2) / (sy_i^2 + b^2 sx_i^2)
 *   (4)  b = sum W beta V / sum W beta U                           repeated from (1) until b settles
 *   (5)  a = Y - b X
 *   (6)  var b = 1 / sum W (beta_i - beta)^2                       beta the W-weighted mean: about adjusted points
 *   (7)  var a = 1 / sum W + (X + beta)^2 var b,  cov(a, b) = -(X + beta) var b
 * Units: those of x and y. A point of weight 0 takes no part.
 *
 * @throws RangeError where there are fewer than two points of weight above zero, columns of uneven lengths, or a point
 * without a standard deviation above zero in either coordinate, or with one that is no number.
 */
export function yorkLine(points: YorkPoints): YorkLine {
  requireYorkPoints(points);
  const xOrigin = mean(points.x);
  const yOrigin = mean(points.y);
  const centred = centredPoints(points, xOrigin, yOrigin);
  if (!xDiffers(centred, xOrigin)) return NO_LINE;

  const slope = settledSlope(centred);
  if (slope === null) return NO_LINE;
  const { interceptAtOrigin, xMean, weightSum, chiSquare, slopeVariance } = lineOfSlope(centred, slope);
  const xLever = xMean + xOrigin;
  return {
    intercept: yOrigin + (interceptAtOrigin - slope * xOrigin), // (5)
    slope,
    interceptVariance: 1 / weightSum + xLever * xLever * slopeVariance, // (7)
    slopeVariance,
    interceptSlopeCovariance: -xLever * slopeVariance,
    chiSquare,
    converged: true,
  };
}

/** Equations (1) to (4), repeated from the unweighted line of y on x. Null where the slope does not settle. */
function settledSlope(points: readonly CentredPoint[]): number | null {
  let xx = 0;
  let xy = 0;
  let yy = 0;
  for (const { x, y } of points) {
    xx += x * x;
    xy += x * y;
    yy += y * y;
  }
  const scale = Math.sqrt(yy / xx); // a slope that is zero settles against this, not against itself
  let slope = xy / xx;
  for (let iteration = 0; iteration < MOST_ITERATIONS; iteration += 1) {
    const next = improvedSlope(points, slope);
    if (!Number.isFinite(next)) return null;
    if (Math.abs(next - slope) <= 1e-13 * Math.max(scale, Math.abs(next))) return next;
    slope = next;
  }
  return null;
}

function improvedSlope(points: readonly CentredPoint[], slope: number): number {
  const { xMean, yMean } = weightedMeans(points, slope);
  let above = 0;
  let below = 0;
  for (const { x, y, xVariance, yVariance, weight } of points) {
    const variance = yVariance + slope * slope * xVariance;
    const u = x - xMean;
    const v = y - yMean;
    const weightedBeta = (weight * (u * yVariance + slope * v * xVariance)) / (variance * variance); // (1), (3)
    above += weightedBeta * v;
    below += weightedBeta * u;
  }
  return above / below; // (4)
}

function weightedMeans(points: readonly CentredPoint[], slope: number) {
  let weightSum = 0;
  let xSum = 0;
  let ySum = 0;
  for (const { x, y, xVariance, yVariance, weight } of points) {
    const w = weight / (yVariance + slope * slope * xVariance); // (1)
    weightSum += w;
    xSum += w * x;
    ySum += w * y;
  }
  return { weightSum, xMean: xSum / weightSum, yMean: ySum / weightSum };
}

/** What follows from the settled slope; `xMean` is the weighted mean of the adjusted points. */
function lineOfSlope(points: readonly CentredPoint[], slope: number) {
  const { weightSum, xMean, yMean } = weightedMeans(points, slope);
  let betaSum = 0;
  let betaSquareSum = 0;
  let chiSquare = 0;
  for (const { x, y, xVariance, yVariance, weight } of points) {
    const variance = yVariance + slope * slope * xVariance;
    const w = weight / variance;
    const u = x - xMean;
    const v = y - yMean;
    const beta = (u * yVariance + slope * v * xVariance) / variance; // (3)
    betaSum += w * beta;
    betaSquareSum += w * beta * beta;
    chiSquare += w * (v - slope * u) * (v - slope * u);
  }
  const betaMean = betaSum / weightSum;
  return {
    interceptAtOrigin: yMean - slope * xMean,
    xMean: xMean + betaMean,
    weightSum,
    chiSquare,
    slopeVariance: 1 / (betaSquareSum - weightSum * betaMean * betaMean), // (6)
  };
}

