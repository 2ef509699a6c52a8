type Numbers = Float64Array | readonly number[];

/** Points with a standard deviation (1 sigma) for each coordinate, independent of each other and of the other points. */
export interface YorkPoints {
  readonly x: Numbers;
  readonly y: Numbers;
  readonly xSigma: Numbers;
  readonly ySigma: Numbers;
  /** 0 to 1 each, multiplying the inverse variances; 1 where none are given. */
  readonly weights?: Numbers;
}

/** A point measured from the points' mean, so that x of 0.05 and y of 1.7e9 lose no digits. */
export interface CentredPoint {
  readonly x: number;
  readonly y: number;
  readonly xVariance: number;
  readonly yVariance: number;
  readonly weight: number;
}

/** The points of weight above zero, measured from an origin. */
export function centredPoints(points: YorkPoints, xOrigin: number, yOrigin: number): CentredPoint[] {
  const centred: CentredPoint[] = [];
  for (let i = 0; i < points.x.length; i += 1) {
    const weight = points.weights === undefined ? 1 : (points.weights[i] ?? NaN);
    if (!(weight > 0)) continue;
    const xSigma = points.xSigma[i] ?? NaN;
    const ySigma = points.ySigma[i] ?? NaN;
    const x = (points.x[i] ?? NaN) - xOrigin;
    const y = (points.y[i] ?? NaN) - yOrigin;
    centred.push({ x, y, xVariance: xSigma * xSigma, yVariance: ySigma * ySigma, weight });
  }
  return centred;
}

/** Whether the points' x differ by more than rounding would make them. */
export function xDiffers(points: readonly CentredPoint[], xOrigin: number): boolean {
  let low = Infinity;
  let high = -Infinity;
  for (const { x } of points) {
    low = Math.min(low, x);
    high = Math.max(high, x);
  }
  return high - low > 1e-12 * Math.abs(xOrigin);
}

export function mean(values: Numbers): number {
  let sum = 0;
  for (const value of values) sum += value;
  return sum / values.length;
}

/**
 * @throws RangeError where there are fewer than two points of weight above zero, columns of uneven lengths, or a point
 * without a standard deviation above zero in either coordinate, or with one that is no number.
 */
export function requireYorkPoints({ x, y, xSigma, ySigma, weights }: YorkPoints): void {
  const count = x.length;
  if ([y, xSigma, ySigma, weights ?? x].some((values) => values.length !== count)) {
    throw new RangeError("A line needs as many standard deviations and weights as points.");
  }
  let weighted = 0;
  for (let i = 0; i < count; i += 1) {
    if (weights !== undefined && !((weights[i] ?? NaN) > 0)) continue;
    weighted += 1;
    const sx = xSigma[i] ?? NaN;
    const sy = ySigma[i] ?? NaN;
    if (sx >= 0 && sy >= 0 && sx + sy > 0 && sx + sy < Infinity) continue;
    throw new RangeError(`Point ${i + 1} needs a standard deviation above zero in one of its coordinates; found ${sx} and ${sy}.`);
  }
  if (weighted >= 2) return;
  throw new RangeError(`A line needs two points; found ${weighted}.`);
}
