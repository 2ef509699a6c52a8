import type { Judgement } from "./judge.ts";

export interface ClockTally {
  readonly storms: number;
  /** Wrong clocks called wrong. */
  readonly named: number;
  /** Of those: with an offset within 12 h of theirs. */
  readonly namedWithinHalfADay: number;
  /** Of those: stated offset within two of its standard deviations of the true one. */
  readonly withinTwoSigmas: number;
  readonly rightClocks: number;
  readonly rightAccused: number;
}

export function tallyClocks(judgements: readonly Judgement[]): ClockTally {
  const named = judgements.flatMap(({ clock }) => clock.named ?? []);
  return {
    storms: judgements.length,
    named: named.length,
    namedWithinHalfADay: named.filter(({ offSeconds }) => Math.abs(offSeconds) < 12 * 3600).length,
    withinTwoSigmas: named.filter(({ offSeconds, sigmaSeconds }) => Math.abs(offSeconds) <= 2 * sigmaSeconds).length,
    rightClocks: judgements.reduce((sum, { clock }) => sum + clock.rightClocks, 0),
    rightAccused: judgements.reduce((sum, { clock }) => sum + clock.rightAccused, 0),
  };
}

export function countHeld(judgements: readonly Judgement[], which: keyof Judgement["held"]): number {
  return judgements.filter(({ held }) => held[which]).length;
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return ((sorted[Math.ceil(sorted.length / 2) - 1] ?? NaN) + (sorted[Math.floor(sorted.length / 2)] ?? NaN)) / 2;
}
