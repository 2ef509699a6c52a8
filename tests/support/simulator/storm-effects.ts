import type { RandomStream } from "./random.ts";

/** How far the stations' views of one storm differ (1 sigma each), as the program's defaults state them. */
export interface EffectSizes {
  readonly pathMetres: number;
  readonly departureSeconds: number;
  readonly sharedCorrelation: number;
  readonly azimuthScaleDegrees: number;
  readonly tiltSecondsPerHz: number;
  readonly scaleFraction: number;
}

export const STATED_EFFECTS: EffectSizes = {
  pathMetres: 150_000,
  departureSeconds: 6 * 3600,
  sharedCorrelation: 0.5,
  azimuthScaleDegrees: 30,
  tiltSecondsPerHz: (4 * 3600) / 0.03,
  scaleFraction: 0.02,
};

export interface StormEffects {
  /** By station: how much longer its path is, and how much later its waves leave. */
  readonly pathMetres: readonly number[];
  readonly departureSeconds: readonly number[];
  /** One for all stations. */
  readonly tiltSecondsPerHz: number;
  readonly scaleFraction: number;
}

export function drawEffects({ azimuthsDegrees, sizes, random }: { azimuthsDegrees: readonly number[]; sizes: EffectSizes; random: RandomStream }): StormEffects {
  const root = choleskyRoot(azimuthsDegrees.map((a, i) => azimuthsDegrees.map((b, j) => (i === j ? 1 : correlation(a, b, sizes)))));
  const draw = (sigma: number): number[] => {
    const independent = azimuthsDegrees.map(() => random.normal());
    return root.map((row) => sigma * row.reduce((sum, weight, j) => sum + weight * (independent[j] ?? NaN), 0));
  };
  return {
    pathMetres: draw(sizes.pathMetres),
    departureSeconds: draw(sizes.departureSeconds),
    tiltSecondsPerHz: sizes.tiltSecondsPerHz * random.normal(),
    scaleFraction: sizes.scaleFraction * random.normal(),
  };
}

function correlation(a: number, b: number, sizes: EffectSizes): number {
  const turn = Math.abs(a - b) % 360;
  return sizes.sharedCorrelation * Math.exp(-Math.min(turn, 360 - turn) / sizes.azimuthScaleDegrees);
}

/** Lower triangle L with L L' = matrix. */
function choleskyRoot(matrix: readonly (readonly number[])[]): number[][] {
  const root = matrix.map((row) => row.map(() => 0));
  const at = (i: number, j: number): number => root[i]?.[j] ?? NaN;
  matrix.forEach((row, i) => {
    for (let j = 0; j <= i; j++) {
      let rest = row[j] ?? NaN;
      for (let k = 0; k < j; k++) rest -= at(i, k) * at(j, k);
      const target = root[i];
      if (target) target[j] = i === j ? Math.sqrt(rest) : rest / at(j, j);
    }
  });
  return root;
}
