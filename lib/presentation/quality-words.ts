import type { QualityFlag } from "#lib/core/arrival/quality.ts";

/** QARTOD's flags in words. */
export const QUALITY_WORDS: readonly (readonly [QualityFlag, string])[] = [
  [1, "good"],
  [2, "not evaluated"],
  [3, "suspect"],
  [4, "bad"],
  [9, "missing"],
];
