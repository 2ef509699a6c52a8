import type { Position } from "#lib/core/units/position.ts";

/**
 * Lengths and bearings on the WGS84 ellipsoid after Vincenty (1975), Survey Review 23 (176), 88-93: to 0.1 mm, but
 * not for points near each other's antipode. Kept apart from the program's own geodesics on purpose.
 */
const EQUATOR_METRES = 6378137;
const FLATTENING = 1 / 298.257223563;
const POLE_METRES = EQUATOR_METRES * (1 - FLATTENING);
const RADIAN = Math.PI / 180;

export interface Leg {
  readonly distanceMetres: number;
  readonly headsTowardDegrees: number;
}

/** @throws Error where the iteration does not settle (nearly antipodal points). */
export function legBetween(from: Position, to: Position): Leg {
  const { sin: sinU1, cos: cosU1 } = reduced(from.latitudeDegrees);
  const { sin: sinU2, cos: cosU2 } = reduced(to.latitudeDegrees);
  const apart = (to.longitudeDegrees - from.longitudeDegrees) * RADIAN;
  let lambda = Math.atan2(Math.sin(apart), Math.cos(apart));
  const start = lambda;
  for (let pass = 0; pass < 200; pass++) {
    const sinLambda = Math.sin(lambda);
    const cosLambda = Math.cos(lambda);
    const across = cosU1 * sinU2 - sinU1 * cosU2 * cosLambda;
    const sinSigma = Math.hypot(cosU2 * sinLambda, across);
    if (sinSigma === 0) return { distanceMetres: 0, headsTowardDegrees: 0 };
    const cosSigma = sinU1 * sinU2 + cosU1 * cosU2 * cosLambda;
    const sigma = Math.atan2(sinSigma, cosSigma);
    const sinAlpha = (cosU1 * cosU2 * sinLambda) / sinSigma;
    const cosSquareAlpha = 1 - sinAlpha ** 2;
    const cosMiddle = cosSquareAlpha < 1e-14 ? 0 : cosSigma - (2 * sinU1 * sinU2) / cosSquareAlpha;
    const next = start + lambdaCorrection({ cosSquareAlpha, sinAlpha, sigma, sinSigma, cosSigma, cosMiddle });
    const settled = Math.abs(next - lambda) < 1e-12;
    lambda = next;
    if (!settled) continue;
    const { a, b } = series(cosSquareAlpha);
    return {
      distanceMetres: POLE_METRES * a * (sigma - sigmaCorrection({ b, sinSigma, cosSigma, cosMiddle })),
      headsTowardDegrees: compass(Math.atan2(cosU2 * sinLambda, across)),
    };
  }
  throw new Error(`No length found from ${JSON.stringify(from)} to ${JSON.stringify(to)}: they are nearly antipodal.`);
}

export function pointAlong(from: Position, { distanceMetres, headsTowardDegrees }: Leg): Position {
  const { sin: sinU1, cos: cosU1 } = reduced(from.latitudeDegrees);
  const sinAlpha1 = Math.sin(headsTowardDegrees * RADIAN);
  const cosAlpha1 = Math.cos(headsTowardDegrees * RADIAN);
  const sigma1 = Math.atan2(sinU1, cosU1 * cosAlpha1);
  const sinAlpha = cosU1 * sinAlpha1;
  const cosSquareAlpha = 1 - sinAlpha ** 2;
  const { a, b } = series(cosSquareAlpha);
  const plain = distanceMetres / (POLE_METRES * a);
  let sigma = plain;
  let cosMiddle = 0;
  for (let pass = 0; pass < 100; pass++) {
    cosMiddle = Math.cos(2 * sigma1 + sigma);
    const next = plain + sigmaCorrection({ b, sinSigma: Math.sin(sigma), cosSigma: Math.cos(sigma), cosMiddle });
    const settled = Math.abs(next - sigma) < 1e-13;
    sigma = next;
    if (settled) break;
  }
  cosMiddle = Math.cos(2 * sigma1 + sigma);
  const sinSigma = Math.sin(sigma);
  const cosSigma = Math.cos(sigma);
  const down = sinU1 * sinSigma - cosU1 * cosSigma * cosAlpha1;
  const latitude = Math.atan2(sinU1 * cosSigma + cosU1 * sinSigma * cosAlpha1, (1 - FLATTENING) * Math.hypot(sinAlpha, down));
  const lambda = Math.atan2(sinSigma * sinAlpha1, cosU1 * cosSigma - sinU1 * sinSigma * cosAlpha1);
  const shift = lambda - lambdaCorrection({ cosSquareAlpha, sinAlpha, sigma, sinSigma, cosSigma, cosMiddle });
  return { latitudeDegrees: latitude / RADIAN, longitudeDegrees: withinHalfTurn(from.longitudeDegrees + shift / RADIAN) };
}

/** Within 0.6 %: for choosing places, also near an antipode. */
export function roughMetres(from: Position, to: Position): number {
  const north = Math.sin(((to.latitudeDegrees - from.latitudeDegrees) * RADIAN) / 2);
  const east = Math.sin(((to.longitudeDegrees - from.longitudeDegrees) * RADIAN) / 2);
  const chord = north ** 2 + Math.cos(from.latitudeDegrees * RADIAN) * Math.cos(to.latitudeDegrees * RADIAN) * east ** 2;
  return 2 * 6371008.8 * Math.asin(Math.min(1, Math.sqrt(chord)));
}

interface Arc {
  readonly cosSquareAlpha: number;
  readonly sinAlpha: number;
  readonly sigma: number;
  readonly sinSigma: number;
  readonly cosSigma: number;
  readonly cosMiddle: number;
}

function reduced(latitudeDegrees: number): { sin: number; cos: number } {
  const u = Math.atan((1 - FLATTENING) * Math.tan(latitudeDegrees * RADIAN));
  return { sin: Math.sin(u), cos: Math.cos(u) };
}

function series(cosSquareAlpha: number): { a: number; b: number } {
  const u = (cosSquareAlpha * (EQUATOR_METRES ** 2 - POLE_METRES ** 2)) / POLE_METRES ** 2;
  return {
    a: 1 + (u / 16384) * (4096 + u * (-768 + u * (320 - 175 * u))),
    b: (u / 1024) * (256 + u * (-128 + u * (74 - 47 * u))),
  };
}

function sigmaCorrection({ b, sinSigma, cosSigma, cosMiddle }: { b: number; sinSigma: number; cosSigma: number; cosMiddle: number }): number {
  const inner = cosSigma * (2 * cosMiddle ** 2 - 1) - (b / 6) * cosMiddle * (4 * sinSigma ** 2 - 3) * (4 * cosMiddle ** 2 - 3);
  return b * sinSigma * (cosMiddle + (b / 4) * inner);
}

function lambdaCorrection({ cosSquareAlpha, sinAlpha, sigma, sinSigma, cosSigma, cosMiddle }: Arc): number {
  const c = (FLATTENING / 16) * cosSquareAlpha * (4 + FLATTENING * (4 - 3 * cosSquareAlpha));
  return (1 - c) * FLATTENING * sinAlpha * (sigma + c * sinSigma * (cosMiddle + c * cosSigma * (2 * cosMiddle ** 2 - 1)));
}

function compass(angle: number): number {
  return (angle / RADIAN + 360) % 360;
}

function withinHalfTurn(longitudeDegrees: number): number {
  return ((((longitudeDegrees + 180) % 360) + 360) % 360) - 180;
}
