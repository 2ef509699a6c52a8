import { describe, expect, test } from "vitest";
import { threeSigma } from "../support/coverage/binomial.ts";
import { judgeSeries, prepareBench } from "../support/coverage/judge.ts";
import { countHeld, median } from "../support/coverage/tally.ts";
import { expectWithin } from "../support/expect-within.ts";

const STORMS = 150;
const LIMIT_MILLISECONDS = 600_000;

describe("regions when one station of five follows another storm", () => {
  test("hold the truth as often as they say, and the station is told apart", { timeout: LIMIT_MILLISECONDS }, () => {
    const judgements = judgeSeries(prepareBench(), { recipe: "wrong-station", seed: 2, from: 0, to: STORMS });
    const because = "three standard deviations of a binomial count";
    expectWithin(countHeld(judgements, "ninetyFive"), 0.95 * STORMS, { absolute: threeSigma(STORMS, 0.95), unit: "storms", because });
    expectWithin(countHeld(judgements, "half"), 0.5 * STORMS, { absolute: threeSigma(STORMS, 0.5), unit: "storms", because });
    // A storm thousands of kilometres and days away is seldom in doubt: half of the stations must be out almost surely.
    expect(median(judgements.map(({ wrongBelongs }) => wrongBelongs ?? NaN))).toBeLessThan(0.05);
  });
});
