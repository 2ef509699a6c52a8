import { availableParallelism } from "node:os";
import { Worker } from "node:worker_threads";
import type { Judgement, Series } from "../support/coverage/judge.ts";
import type { RecipeName } from "../support/coverage/recipes.ts";
import { countHeld, median, tallyClocks } from "../support/coverage/tally.ts";

/**
 * How often the stated regions hold the truth, in simulations. OFFING_COVERAGE_STORMS makes a shorter run of it.
 * The stressed cases break the stated spread on purpose: reported, not gated.
 */
const STORMS = Number(process.env.OFFING_COVERAGE_STORMS ?? 4000);
const STRESSED_STORMS = Math.ceil(STORMS / 10);
const SEEDS = [101, 102, 103];
const MEASURED = new URL("./coverage-worker.mjs", import.meta.url);

const STRESSED: readonly RecipeName[] = [
  "waves-bins-0.005-corrected",
  "waves-bins-0.005",
  "waves-bins-0.01-corrected",
  "waves-bins-0.01",
  "waves-timed",
  "waves-one-coast",
];

interface Target {
  readonly from?: number;
  readonly to?: number;
}

for (const seed of SEEDS) {
  await cover("matched", seed, STORMS, { half: { from: 0.46, to: 0.54 }, ninetyFive: { from: 0.93, to: 0.97 } });
  await cover("wrong-station", seed, Math.ceil(STORMS / 4), { half: { from: 0.42, to: 0.58 }, ninetyFive: { from: 0.92, to: 0.98 } });
}
for (const recipe of ["wrong-day", "wrong-day-waves"] as const) await nameClocks(recipe, SEEDS[0] ?? NaN, STRESSED_STORMS);
for (const recipe of STRESSED) await cover(recipe, SEEDS[0] ?? NaN, STRESSED_STORMS, {});

async function cover(recipe: RecipeName, seed: number, storms: number, targets: { half?: Target; ninetyFive?: Target }): Promise<void> {
  const judgements = await judgeInParallel(recipe, seed, storms);
  const placed = judgements.flatMap(({ offMetres }) => offMetres ?? []);
  const timed = judgements.flatMap(({ offSeconds }) => (offSeconds === null ? [] : [Math.abs(offSeconds)]));
  const held = (which: keyof Judgement["held"]): number => countHeld(judgements, which) / storms;
  report(`coverage ${recipe} 50 %`, seed, storms, held("half"), "of storms", targets.half);
  report(`coverage ${recipe} 90 %`, seed, storms, held("ninety"), "of storms");
  report(`coverage ${recipe} 95 %`, seed, storms, held("ninetyFive"), "of storms", targets.ninetyFive);
  if (recipe === "matched") {
    const { rightAccused, rightClocks } = tallyClocks(judgements);
    report("right clocks accused matched", seed, storms, rightAccused / rightClocks, "of right clocks", { to: 0.01 });
  }
  report(`placed ${recipe}`, seed, storms, placed.length / storms, "of storms");
  report(`median error ${recipe}`, seed, storms, median(placed) / 1000, "km");
  report(`median time error ${recipe}`, seed, storms, median(timed) / 3600, "h");
  report(`median 95 % area ${recipe}`, seed, storms, median(judgements.map((j) => j.areaSquareMetres)) / 1e12, "million km2");
}

async function nameClocks(recipe: RecipeName, seed: number, storms: number): Promise<void> {
  const tally = tallyClocks(await judgeInParallel(recipe, seed, storms));
  report(`named ${recipe}`, seed, storms, tally.named / tally.storms, "of wrong clocks", { from: 0.9 });
  report(`named within 12 h ${recipe}`, seed, storms, tally.namedWithinHalfADay / tally.storms, "of wrong clocks", { from: 0.9 });
  report(`offset within two sigmas ${recipe}`, seed, storms, tally.withinTwoSigmas / tally.named, "of those named", { from: 0.95 });
  report(`right clocks accused ${recipe}`, seed, storms, tally.rightAccused / tally.rightClocks, "of right clocks", { to: 0.01 });
}

async function judgeInParallel(recipe: RecipeName, seed: number, storms: number): Promise<Judgement[]> {
  const workers = Math.min(2, availableParallelism());
  const bounds = Array.from({ length: workers + 1 }, (_, i) => Math.round((i * storms) / workers));
  const parts = bounds.slice(1).map((to, i) => judgeApart({ recipe, seed, from: bounds[i] ?? NaN, to }));
  return (await Promise.all(parts)).flat();
}

function judgeApart(series: Series): Promise<Judgement[]> {
  return new Promise((resolve, reject) => {
    const worker = new Worker(MEASURED, { workerData: series });
    worker.once("message", resolve);
    worker.once("error", reject);
  });
}

function report(bench: string, seed: number, storms: number, value: number, unit: string, target?: Target): void {
  console.log(JSON.stringify({ bench, seed, storms, value: Number(value.toPrecision(4)), unit, ...(target ? { target } : {}) }));
}
