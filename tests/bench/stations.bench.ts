/**
 * 2,000 stations of two deployments each brought in from a CSV file, kept on a real database: through the use case, and
 * over HTTP to a server of its own (this needs `npm run build` first); then the same file previewed when it changes
 * nothing, changed in every station, and written out.
 */
import { mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { exportStations } from "#lib/application/export-stations.ts";
import { previewStations, takeInStations } from "#lib/application/take-in-stations.ts";
import { openStore } from "#lib/store/open-store.ts";
import { MIGRATIONS_DIRECTORY } from "../support/migrations-directory.ts";
import { serveDemo } from "../support/served-demo.ts";
import { inventedStationFile } from "../support/station-file.ts";

const COUNT = 2000;
const TARGET_SECONDS = 5;
const text = inventedStationFile(COUNT);
const doing = { actor: "bench", savedEpochSeconds: 1_700_000_000 };

async function timed<Value>(bench: string, target: number | null, work: () => Promise<Value>): Promise<Value> {
  const began = performance.now();
  const value = await work();
  const seconds = Number(((performance.now() - began) / 1000).toFixed(2));
  console.log(JSON.stringify({ bench, value: seconds, unit: "s", ...(target === null ? {} : { target }), megabytes: Number((text.length / 1e6).toFixed(2)) }));
  return value;
}

function requireCount(what: string, count: number): void {
  if (count !== COUNT) throw new Error(`${what}: ${count} of ${COUNT} stations.`);
}

const dataDirectory = mkdtempSync(join(tmpdir(), "offing-stations-"));
const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
try {
  const take = (file: string) => takeInStations(store, { text: file, fileName: "stations.csv", token: null }, doing);
  requireCount("added", (await timed("stations-import", TARGET_SECONDS, () => take(text))).added.length);
  requireCount("unchanged", (await timed("stations-preview-unchanged", null, () => previewStations(store, { text, fileName: "stations.csv" }))).unchanged.length);
  requireCount("changed", (await timed("stations-change", TARGET_SECONDS, () => take(text.replaceAll("CC-BY-4.0", "CC0")))).changed.length);
  requireCount("exported", new Set((await timed("stations-export", null, () => exportStations(store))).split("\n").map((row) => row.split(",")[0])).size - 2);
} finally {
  await store.close();
  rmSync(dataDirectory, { recursive: true, force: true });
}

const demo = await serveDemo();
try {
  const post = async (query: string) => {
    const response = await fetch(`${demo.address}api/v1/stations.csv${query}`, { method: "POST", headers: { "content-type": "text/csv" }, body: text });
    if (!response.ok) throw new Error(await response.text());
    return (await response.json()) as { added: string[]; token: string };
  };
  const { token } = await timed("stations-preview-http", TARGET_SECONDS, () => post("?preview=yes"));
  requireCount("added", (await timed("stations-import-http", TARGET_SECONDS, () => post(`?token=${token}`))).added.length);
} finally {
  await demo.stop();
}
