import { spawnSync } from "node:child_process";
import { cpSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { InputError } from "#lib/core/failures/input-error.ts";
import { broughtIn } from "#tests/support/brought-in.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";
import { temporaryStore } from "#tests/support/temporary-store.ts";
import { readEventFolder, saveEvents } from "../../prisma/seed-events.ts";

const DEMO = "fixtures/scenarios/demo";
const BY = { actor: "test", savedEpochSeconds: 1_700_000_000 };

function problemsOf(directory: string): string[] {
  try {
    readEventFolder(directory);
  } catch (error) {
    if (error instanceof InputError) return error.issues.map(({ message }) => message);
    throw error;
  }
  throw new Error("The folder was taken.");
}

test("a folder of events is saved whole, and again only what is new", async () => {
  const { store } = await temporaryStore();
  const { value: events, notes } = readEventFolder(DEMO);
  expect(notes).toStrictEqual([]);
  expect(events.map(({ id }) => id)).toStrictEqual(["albatross", "fulmar", "gannet", "heron", "petrel", "tern"]);
  const first = await saveEvents(store, events.slice(1), BY);
  expect(first).toStrictEqual({ saved: ["fulmar", "gannet", "heron", "petrel", "tern"], refused: [] });
  const second = await saveEvents(store, events, BY);
  expect(second.saved).toStrictEqual(["albatross"]);
  expect(second.refused).toHaveLength(5);
  expect(second.refused[0]).toBe('fulmar: An event "fulmar" is stored already.');
  const petrel = await store.loadEvent("petrel");
  expect(broughtIn(petrel)).toStrictEqual(events.find(({ id }) => id === "petrel"));
  // Rows of the files under fixtures/, counted by hand, the headers left out.
  expect(petrel?.observations.readings).toHaveLength(60);
  expect(petrel?.observations.estimates).toHaveLength(1);
  expect(new Set(petrel?.observations.deployments.map(({ stationId }) => stationId)).size).toBe(6);
});

test("an error that was taken for want of any is told at intake, and stands in the event's note", () => {
  const directory = temporaryDirectory();
  const from = readFileSync(join(DEMO, "heron", "readings.csv"), "utf8").trim().split("\n");
  const withoutErrors = from.map((line) => { const [station, time, period] = line.split(","); return [station, time, period].join(","); });
  cpSync(join(DEMO, "stations.csv"), join(directory, "stations.csv"));
  for (const [id, file] of [["noted", '{"title": "One", "note": "From the south."}'], ["plain", '{"title": "Two"}']] as const) {
    mkdirSync(join(directory, id));
    writeFileSync(join(directory, id, "event.json"), file);
    writeFileSync(join(directory, id, "readings.csv"), withoutErrors.join("\n"));
  }
  const { value, notes } = readEventFolder(directory);
  const taken = (id: string): string[] => [
    `${id}/readings.csv, 18 rows: kind ridge and no time_sigma_s; 1800 s was used.`,
    `${id}/readings.csv, 18 rows: kind ridge and no error of the period or frequency; 0 was used.`,
  ];
  expect(notes.map(({ message }) => message)).toStrictEqual([...taken("noted"), ...taken("plain")]);
  const said = (id: string): string => taken(id).map((message) => `Assumed at intake: ${message}`).join(" ");
  expect(value.map(({ note }) => note)).toStrictEqual([`From the south. ${said("noted")}`, said("plain")]);

  const data = join(directory, "data");
  const run = spawnSync(process.execPath, ["--import", "tsx", "prisma/seed.ts", "--data", data, "--from", directory], { encoding: "utf8" });
  expect(run).toMatchObject({ status: 0, stdout: "Saved 2 events: noted, plain.\n" });
  expect(run.stderr.trim().split("\n")).toStrictEqual([...taken("noted"), ...taken("plain")].map((message) => `Warning: ${message}`));
});

test("what is wrong with a folder is told of all its events at once, by file, row and column", () => {
  const directory = join(temporaryDirectory(), "events");
  cpSync(DEMO, directory, { recursive: true });
  writeFileSync(join(directory, "heron", "readings.csv"), "station,time,period_s\ncol,2022-06-05T00:00Z,NaN\n");
  writeFileSync(join(directory, "tern", "event.json"), '{"title": ""}');
  mkdirSync(join(directory, "empty"));
  writeFileSync(join(directory, "empty", "event.json"), '{"title": "Nothing", "note": ""}');
  const problems = problemsOf(directory);
  expect(problems).toHaveLength(3);
  expect(problems[0]).toMatch(/empty: found neither readings\.csv nor arrivals\.csv; wanted one of them at least\.$/);
  expect(problems[1]).toBe('heron/readings.csv, row 2, column period_s: found "NaN"; wanted a number of seconds from 0.5 to 1000.');
  expect(problems[2]).toMatch(/^tern\/event\.json: found something else; wanted \{"title"/);
});

test("a folder without stations, or without events, is refused", () => {
  const directory = temporaryDirectory();
  expect(problemsOf(directory)[0]).toMatch(/found no stations\.csv; wanted one/);
  writeFileSync(join(directory, "stations.csv"), "id,name,latitude,longitude\na,A,0,0\n");
  expect(problemsOf(directory)[0]).toMatch(/found no event; wanted a folder for each/);
});
