import type { StationReading } from "#lib/core/arrival/observations.ts";
import { GRAVITY } from "./deep-water.ts";
import { DEMO_EVENTS, type DemoEvent } from "./demo-events.ts";
import { DEMO_STATIONS, type DemoStation } from "./demo-stations.ts";
import { physicalReadings, type ReadingWay } from "./physical-readings.ts";
import { drawModerateStorm, type PhysicalStorm } from "./physical-storm.ts";
import { randomStream, type RandomStream } from "./random.ts";
import { withClockOffset } from "./simulated-event.ts";

const RIDGE: ReadingWay = { kind: "ridge", binWidthHz: 0.005, frequency: "energy-mean", noiseSeconds: 900 };
const TIMED: ReadingWay = { kind: "timed", everyHours: 3 };

/** Every file of the demo scenario, by its path below the scenario's folder. The same storms each time. */
export function demoFiles(): ReadonlyMap<string, string> {
  const files = new Map([["stations.csv", stationsCsv()]]);
  for (const event of DEMO_EVENTS) {
    for (const [name, text] of eventFiles(event)) files.set(`${event.id}/${name}`, text);
  }
  return files;
}

function stationsCsv(): string {
  const rows = DEMO_STATIONS.map(({ id, name, position, depthMetres, sensor, timeZone }) =>
    [id, name, position.latitudeDegrees, position.longitudeDegrees, sensor === "ground" ? "" : depthMetres, sensor, timeZone].join(","),
  );
  return lines(["id,name,latitude,longitude,depth_m,sensor,time_zone", ...rows]);
}

function eventFiles(event: DemoEvent): [string, string][] {
  const random = randomStream(event.seed);
  const storm = drawModerateStorm({ centre: event.storm, originEpochSeconds: event.originEpochSeconds, random });
  const readAt = (id: string, way: ReadingWay): StationReading[] => physicalReadings({ storm, station: stationOf(id), random, way });
  const read = [...event.ridge.flatMap((id) => readAt(id, RIDGE)), ...event.timed.flatMap((id) => readAt(id, TIMED))];
  const readings = event.clock ? withClockOffset(read, event.clock.station, event.clock.offsetSeconds) : read;
  const estimates = event.estimated.map((id) => estimateRow(id, storm, random));
  const files: [string, string][] = [
    ["event.json", `${JSON.stringify({ title: event.title, note: event.note }, null, 2)}\n`],
    ["readings.csv", lines(["station,time,period_s,period_sigma_s,time_sigma_s,kind", ...readings.map(readingRow)])],
  ];
  if (estimates.length > 0) {
    files.push(["arrivals.csv", lines(["station,distance_km,origin_time,distance_sigma_km,origin_time_sigma_h,correlation", ...estimates])]);
  }
  return files;
}

/** A station in the ground hears each swell at twice its frequency. */
function readingRow({ stationId, reading }: StationReading): string {
  const heard = stationOf(stationId).sensor === "ground" ? 2 : 1;
  const periodSeconds = 1 / (reading.frequencyHz * heard);
  const sigma = reading.kind === "timed" ? (periodSeconds * (reading.frequencySigmaHz / reading.frequencyHz)).toFixed(2) : "0";
  const period = reading.kind === "timed" ? periodSeconds.toFixed(1) : periodSeconds.toFixed(3);
  return [stationId, iso(reading.arrivalEpochSeconds), period, sigma, reading.arrivalSigmaSeconds, reading.kind].join(",");
}

/** What a group would share that fitted its own ridge by least squares: rounded as people round. */
function estimateRow(id: string, storm: PhysicalStorm, random: RandomStream): string {
  const readings = physicalReadings({ storm, station: stationOf(id), random, way: RIDGE }).map(({ reading }) => reading);
  const meanHz = readings.reduce((sum, r) => sum + r.frequencyHz, 0) / readings.length;
  const meanTime = readings.reduce((sum, r) => sum + r.arrivalEpochSeconds, 0) / readings.length;
  const across = readings.reduce((sum, r) => sum + (r.frequencyHz - meanHz) * (r.arrivalEpochSeconds - meanTime), 0);
  const slope = across / readings.reduce((sum, r) => sum + (r.frequencyHz - meanHz) ** 2, 0);
  const distanceKilometres = Math.round((slope * GRAVITY) / (4 * Math.PI) / 1e4) * 10;
  return [id, distanceKilometres, iso(Math.round((meanTime - slope * meanHz) / 3600) * 3600), Math.round(distanceKilometres * 0.04), 7, -0.9].join(",");
}

function stationOf(id: string): DemoStation {
  const station = DEMO_STATIONS.find((candidate) => candidate.id === id);
  if (!station) throw new Error(`The demo has no station ${id}.`);
  return station;
}

function iso(epochSeconds: number): string {
  return new Date(Math.round(epochSeconds / 60) * 60_000).toISOString().replace(":00.000Z", "Z");
}

function lines(rows: readonly string[]): string {
  return `${rows.join("\n")}\n`;
}
