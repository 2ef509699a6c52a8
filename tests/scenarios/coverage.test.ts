import { describe, expect, test } from "vitest";
import { threeSigma } from "../support/coverage/binomial.ts";
import { judgeSeries, prepareBench } from "../support/coverage/judge.ts";
import { countHeld } from "../support/coverage/tally.ts";
import { expectWithin } from "../support/expect-within.ts";

const STORMS = 400;
const LIMIT_MILLISECONDS = 600_000;

/** The simulator shares no code with the estimator; the law of the counts is the binomial one. */
describe("regions of storms that follow the stated spread", () => {
  test("hold the truth as often as they say", { timeout: LIMIT_MILLISECONDS }, () => {
    const judgements = judgeSeries(prepareBench(), { recipe: "matched", seed: 1, from: 0, to: STORMS });
    expect(judgements).toHaveLength(STORMS);
    expect(judgements.filter(({ sight }) => sight)).toHaveLength(STORMS / 4);
    const because = "three standard deviations of a binomial count";
    expectWithin(countHeld(judgements, "ninetyFive"), 0.95 * STORMS, { absolute: threeSigma(STORMS, 0.95), unit: "storms", because });
    expectWithin(countHeld(judgements, "ninety"), 0.9 * STORMS, { absolute: threeSigma(STORMS, 0.9), unit: "storms", because });
    expectWithin(countHeld(judgements, "half"), 0.5 * STORMS, { absolute: threeSigma(STORMS, 0.5), unit: "storms", because });
  });
});
