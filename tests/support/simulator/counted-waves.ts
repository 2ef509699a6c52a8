import type { RandomStream } from "./random.ts";

/** A sea of one Gaussian peak, and how many of its waves somebody counts. */
export interface CountedSea {
  readonly waves: number;
  readonly peakHz: number;
  readonly widthHz: number;
}

const COMPONENTS = 100;
/** Of the spectrum's width, to either side. */
const REACH_WIDTHS = 3.5;
const STEP_SECONDS = 1;
/** A thumb on a stopwatch, at either end of the count. */
const PRESS_SIGMA_SECONDS = 0.5;

/**
 * Seconds that a watch shows for so many waves, from the first rise through the mean level to the last one. The sea is a
 * sum of cosines, one in each slice of its spectrum, with normal amplitudes; it is walked through step by step.
 */
export function countedWaves({ waves, peakHz, widthHz }: CountedSea, random: RandomStream): number {
  const widths = Float64Array.from({ length: COMPONENTS }, (_, i) => REACH_WIDTHS * ((2 * (i + random.uniform())) / COMPONENTS - 1));
  const omega = widths.map((from) => 2 * Math.PI * (peakHz + widthHz * from));
  const amplitude = widths.map((from) => Math.exp(-(from ** 2) / 4));
  const cosine = amplitude.map((size) => size * random.normal());
  const sine = amplitude.map((size) => size * random.normal());
  const elevation = (time: number): number => {
    let sum = 0;
    for (let i = 0; i < COMPONENTS; i += 1) sum += (cosine[i] ?? NaN) * Math.cos((omega[i] ?? NaN) * time) + (sine[i] ?? NaN) * Math.sin((omega[i] ?? NaN) * time);
    return sum;
  };
  const rises: number[] = [];
  let before = elevation(0);
  for (let time = STEP_SECONDS; rises.length <= waves; time += STEP_SECONDS) {
    const now = elevation(time);
    if (before < 0 && now >= 0) rises.push(time - (STEP_SECONDS * now) / (now - before));
    before = now;
  }
  const took = (rises[waves] ?? NaN) - (rises[0] ?? NaN);
  return took + PRESS_SIGMA_SECONDS * (random.normal() - random.normal());
}
