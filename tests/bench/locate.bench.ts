import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import { prepareBench } from "../support/coverage/judge.ts";
import { median } from "../support/coverage/tally.ts";
import { drawNetwork } from "../support/simulator/draw-network.ts";
import { drawOrigin, matchedReadings } from "../support/simulator/matched-storm.ts";
import { randomStream } from "../support/simulator/random.ts";
import { observationsOf } from "../support/simulator/simulated-event.ts";

/** A whole answer, leave-one-out and drift included, for ten stations of twenty readings: warm, one core, in process. */
const STORMS = 5;
const RUNS = 5;
const { world, land, pool, sightTables } = prepareBench();

const times = Array.from({ length: STORMS }, (_, storm) => {
  const random = randomStream(40, storm);
  const network = drawNetwork({ world, random, count: 10, pool, inSight: true });
  const readings = matchedReadings({ stations: network.stations, position: network.storm, originEpochSeconds: drawOrigin(random), random, readingsEach: 20 });
  const observations = observationsOf(network.stations, readings);
  const solve = (): number => {
    const started = performance.now();
    solveEvent({ observations, settings: DEFAULT_SETTINGS, land, sightTables });
    return performance.now() - started;
  };
  for (let warming = 0; warming < 3; warming++) solve();
  return Array.from({ length: RUNS }, solve);
});

const slowest = Math.max(...times.map(median));
console.log(JSON.stringify({ bench: "locate", value: Number(median(times.flat()).toFixed(1)), unit: "ms", target: 150 }));
console.log(JSON.stringify({ bench: "locate, slowest of five storms", value: Number(slowest.toFixed(1)), unit: "ms" }));
