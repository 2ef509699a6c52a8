/**
 * Reads of the programming interface with 1,000 events of five or six stations, 200 stations and 400 kept answers: how
 * long the server takes from a request to the end of its answer, one after another, each reading operation at least 200
 * times after warming up. Beside it stands what each cost the server's processors, which a busy machine does not change
 * as much. Needs `npm run build` first.
 */
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { Agent, get } from "node:http";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { createLand } from "#lib/application/land.ts";
import { locateEvent } from "#lib/application/locate-event.ts";
import { readLandTopology } from "#lib/application/shipped-files.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { readSettings } from "#lib/contracts/settings.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import { openStore } from "#lib/store/open-store.ts";
import { pathOf, type ApiCall, type OperationId } from "../support/api-client.ts";
import { fillRegister } from "../support/fill-register.ts";
import { MIGRATIONS_DIRECTORY } from "../support/migrations-directory.ts";
import { processFamily } from "../support/process-family.ts";
import { serveFolder, type ServedFolder } from "../support/served-folder.ts";

const SIZE = { stations: 200, events: 1000, keptEvery: 5, keptCount: 2 };
const TARGET_MILLISECONDS = 30;
const WARMING_UP = 30;
const COUNTED = 200;

/** What each operation is asked in turn: other things of the same kind, as readers do. */
const ASKED: Partial<Record<OperationId, (turn: number) => ApiCall>> = {
  describeInterface: () => ({}),
  listReadings: (turn) => ({ query: { station: `st-${String(turn % SIZE.stations).padStart(4, "0")}`, from: "2002-01-01T00:00Z", to: "2004-01-01T00:00Z" } }),
  listArrivals: (turn) => ({ query: turn % 2 === 0 ? {} : { station: `st-${String(turn % SIZE.stations).padStart(4, "0")}` } }),
  readArrival: (turn) => ({ params: { id: 1 + ((turn * 17) % 5000) } }),
  listEvents: () => ({}),
  readEvent: (turn) => ({ params: { id: eventId(turn * 13) } }),
  listLocalizations: (turn) => ({ params: { id: eventId(turn * SIZE.keptEvery) } }),
  readLocalization: (turn) => ({ params: { id: eventId(turn * SIZE.keptEvery), number: 1 + (turn % 2) } }),
  compareLocalizations: (turn) => ({ params: { id: eventId(turn * SIZE.keptEvery), number: 2 }, query: { since: "1" } }),
  listStations: () => ({}),
  readStation: (turn) => ({ params: { id: `st-${String(turn % SIZE.stations).padStart(4, "0")}` } }),
  exportStations: () => ({}),
};

function eventId(number: number): string {
  return `storm-${String(number % SIZE.events).padStart(5, "0")}`;
}

async function fill(dataDirectory: string): Promise<void> {
  const demo = (fileName: string) => ({ fileName, text: readFileSync(`fixtures/scenarios/demo/${fileName}`, "utf8") });
  const { value: observations } = readEventFiles({ stations: demo("stations.csv"), readings: demo("petrel/readings.csv"), arrivals: null });
  const host = { program: "offing", land: createLand({ readTopology: () => readLandTopology({ packageRoot: process.cwd() }) }) };
  const { answer } = locateEvent({ observations, settings: readSettings({}), host });
  const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
  await fillRegister(store, { ...SIZE, answerJson: JSON.stringify(answer), inputJson: JSON.stringify(observations) });
  await store.close();
}

const agent = new Agent({ keepAlive: true, maxSockets: 1 });

function millisecondsOf(address: string): Promise<{ milliseconds: number; bytes: number }> {
  const began = performance.now();
  return new Promise((answer, fail) => {
    get(address, { agent }, (response) => {
      let bytes = 0;
      response.on("data", (part: Buffer) => (bytes += part.length));
      response.on("end", () => {
        if (response.statusCode === 200) answer({ milliseconds: performance.now() - began, bytes });
        else fail(new Error(`${address} answered with ${String(response.statusCode)}.`));
      });
    }).on("error", fail);
  });
}

/** Where the system tells it (Linux), in its ticks of 10 ms. */
function processorMilliseconds(processId: number): number {
  return processFamily(processId).reduce((sum, { id }) => {
    const file = `/proc/${id}/stat`;
    if (!existsSync(file)) return NaN;
    // The name of the program, which may hold anything, stands in brackets before the fields that are counted here.
    const fields = readFileSync(file, "utf8").split(") ").at(-1)?.split(" ") ?? [];
    return sum + (Number(fields[11]) + Number(fields[12])) * 10;
  }, 0);
}

async function measure({ address, processId }: ServedFolder, id: OperationId, asked: (turn: number) => ApiCall): Promise<void> {
  const taken: number[] = [];
  let bytes = 0;
  let processorBefore = NaN;
  for (let turn = 0; turn < WARMING_UP + COUNTED; turn += 1) {
    if (turn === WARMING_UP) processorBefore = processorMilliseconds(processId);
    const one = await millisecondsOf(new URL(pathOf(id, asked(turn)), address).href);
    bytes = Math.max(bytes, one.bytes);
    if (turn >= WARMING_UP) taken.push(one.milliseconds);
  }
  const processor = Number(((processorMilliseconds(processId) - processorBefore) / COUNTED).toFixed(1));
  taken.sort((a, b) => a - b);
  const at = (part: number): number => Number((taken[Math.ceil(part * taken.length) - 1] ?? NaN).toFixed(1));
  console.log(JSON.stringify({ bench: `api-${id}`, value: at(0.95), unit: "ms p95", target: TARGET_MILLISECONDS, p50: at(0.5), processor, kilobytes: Number((bytes / 1000).toFixed(1)) }));
}

const dataDirectory = mkdtempSync(join(tmpdir(), "offing-api-"));
try {
  await fill(dataDirectory);
  const server = await serveFolder(dataDirectory);
  try {
    for (const { id, method } of Object.values(OPERATIONS)) {
      if (method !== "GET") continue;
      const asked = ASKED[id as OperationId];
      if (asked === undefined) throw new Error(`Nothing says what ${id} is asked.`);
      await measure(server, id as OperationId, asked);
    }
  } finally {
    agent.destroy();
    await server.stop();
  }
} finally {
  rmSync(dataDirectory, { recursive: true, force: true });
}
