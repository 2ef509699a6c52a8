import { fitDispersionLine } from "#lib/core/arrival/dispersion-line.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { median } from "../support/coverage/tally.ts";
import { matchedReadings } from "../support/simulator/matched-storm.ts";
import { physicalReadings } from "../support/simulator/physical-readings.ts";
import { drawStorm } from "../support/simulator/physical-storm.ts";
import { randomStream } from "../support/simulator/random.ts";

/** One station's dispersion line from twenty readings of spectra, and from readings timed by hand. */
const station = { id: "shore", position: { latitudeDegrees: 34, longitudeDegrees: -121 } };
const centre = { latitudeDegrees: 42, longitudeDegrees: 160 };
const random = randomStream(41);
const ridge = matchedReadings({ stations: [station], position: centre, originEpochSeconds: 0, random, readingsEach: 20 });
const storm = drawStorm({ centre, originEpochSeconds: 0, random });
const timed = physicalReadings({ storm, station, random, way: { kind: "timed", everyHours: 3 } }).slice(0, 20);

for (const [bench, entries] of [["fit", ridge], ["fit, timed by hand", timed]] as const) {
  const readings = entries.map(({ reading }) => reading);
  const times = Array.from({ length: 60 }, () => {
    const started = performance.now();
    for (let i = 0; i < 100; i++) fitDispersionLine(readings, DEFAULT_SETTINGS);
    return (performance.now() - started) / 100;
  });
  console.log(JSON.stringify({ bench, readings: readings.length, value: Number(median(times.slice(20)).toPrecision(3)), unit: "ms", target: 0.5 }));
}
