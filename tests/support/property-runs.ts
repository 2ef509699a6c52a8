import fc from "fast-check";

// A fixed seed makes a failure repeatable; the long run looks at many more cases under a seed that can be chosen.
const isLongRun = process.env.OFFING_LONG_TESTS === "1";
fc.configureGlobal({
  seed: Number(process.env.OFFING_PROPERTY_SEED ?? 20_260_101),
  ...(isLongRun ? { numRuns: 5000 } : {}),
});
