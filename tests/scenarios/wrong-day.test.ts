import { describe, expect, test } from "vitest";
import { threeSigma } from "../support/coverage/binomial.ts";
import { judgeSeries, prepareBench } from "../support/coverage/judge.ts";
import { tallyClocks } from "../support/coverage/tally.ts";

const STORMS = 100;
const LIMIT_MILLISECONDS = 600_000;

describe("a clock that is a whole day wrong among six", () => {
  const bench = prepareBench();

  test.each([
    ["that follow the stated spread", "wrong-day"],
    ["made of their waves", "wrong-day-waves"],
  ] as const)("is named in storms %s, and right clocks are left alone", { timeout: LIMIT_MILLISECONDS }, (_, recipe) => {
    const tally = tallyClocks(judgeSeries(bench, { recipe, seed: 3, from: 0, to: STORMS }));
    expect(tally.storms).toBe(STORMS);
    expect(tally.rightClocks).toBeGreaterThan(4.5 * STORMS);
    // Asked: named in 90 %, its offset within two stated sigmas in 95 %, 1 % of right clocks accused; each less three
    // standard deviations of the binomial law.
    expect(tally.namedWithinHalfADay).toBeGreaterThanOrEqual(0.9 * STORMS - threeSigma(STORMS, 0.9));
    expect(tally.withinTwoSigmas).toBeGreaterThanOrEqual(0.95 * tally.named - threeSigma(tally.named, 0.95));
    expect(tally.rightAccused).toBeLessThanOrEqual(0.01 * tally.rightClocks + threeSigma(tally.rightClocks, 0.01));
  });
});
