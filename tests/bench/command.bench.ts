/**
 * From the start of the command to its printed answer: `locate --json` with 10 stations of 20 readings, at the
 * defaults. The median of several runs, each a process of its own.
 */
import { spawnSync } from "node:child_process";
import { mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { geodesicInverse } from "#lib/core/geodesy/geodesic.ts";
import { ridgeRows } from "../support/ridge-rows.ts";

const RUNS = 9;
const ENTRY = fileURLToPath(new URL("../../lib/cli/offing.mjs", import.meta.url));
const STORM = { latitudeDegrees: 42, longitudeDegrees: 170 };
/** Invented places on shores and islands that look out on the North Pacific. */
const PLACES = [
  [57, -152], [48, -125], [37, -123], [32, -118], [21, -158], [13, 145], [24, 125], [35, 141], [43, 146], [53, 160],
] as const;

const FREQUENCIES_HZ = Array.from({ length: 20 }, (_, index) => 0.045 + 0.002 * index);

function writeEvent(folder: string): void {
  const stations = PLACES.map(([latitude, longitude], index) => `S${index},Invented ${index},${latitude},${longitude}`);
  const readings = PLACES.flatMap(([latitudeDegrees, longitudeDegrees], index) => {
    const { distanceMetres } = geodesicInverse({ from: STORM, to: { latitudeDegrees, longitudeDegrees } });
    // A fixed misfit of 2 % from station to station, as storms have it.
    const distanceKm = (distanceMetres / 1000) * (1 + 0.02 * Math.sin(2.4 * index));
    return ridgeRows({ station: `S${index}`, distanceKm, start: "2031-02-09T00:00:00Z", frequenciesHz: FREQUENCIES_HZ });
  });
  writeFileSync(join(folder, "s.csv"), ["id,name,latitude,longitude", ...stations].join("\n"));
  writeFileSync(join(folder, "r.csv"), ["station,time,frequency_hz", ...readings].join("\n"));
}

function secondsOfOneRun(folder: string): number {
  const start = performance.now();
  const args = [ENTRY, "locate", "--stations", "s.csv", "--readings", "r.csv", "--json"];
  const { status, stdout, stderr } = spawnSync(process.execPath, args, { cwd: folder, encoding: "utf8", maxBuffer: 1e8 });
  const seconds = (performance.now() - start) / 1000;
  if (status !== 0 || !stdout.includes('"outcome":"located"')) throw new Error(`The command gave no place: ${stderr}`);
  return seconds;
}

const folder = mkdtempSync(join(tmpdir(), "offing-bench-"));
try {
  writeEvent(folder);
  const seconds = Array.from({ length: RUNS }, () => secondsOfOneRun(folder)).sort((a, b) => a - b);
  const median = seconds[Math.floor(RUNS / 2)] ?? Number.NaN;
  console.log(JSON.stringify({ bench: "command-locate-10x20", value: Number(median.toFixed(3)), unit: "s", target: 1.5 }));
} finally {
  rmSync(folder, { recursive: true, force: true });
}
