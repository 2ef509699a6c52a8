import { existsSync } from "node:fs";
import { join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { parseArgs } from "node:util";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { Note } from "#lib/records/note.ts";
import { openStore } from "#lib/store/open-store.ts";
import { readEventFolder, saveEvents } from "./seed-events.ts";
import type { Intake } from "./seed-events.ts";

const USAGE = `npm run intake -- --data DIR --from FOLDER

Saves the events of a folder in a data folder, which is made if it is missing.

  --data DIR     folder that holds the database, as for npm start; not while a server has it
  --from FOLDER  stations.csv, and a folder for each event, named by its id, with event.json
                 ({"title": "...", "note": "..."}, the note as you like) and readings.csv,
                 arrivals.csv or both; the demo's invented events where it is left out`;

const packageRoot = fileURLToPath(new URL("../", import.meta.url));
const DEMO = join(packageRoot, "fixtures", "scenarios", "demo");

async function intake(data: string, from = DEMO): Promise<Intake & { notes: readonly Note[] }> {
  // A script of the package is run from its own folder; where it was called from is left in INIT_CWD.
  const folder = process.env.INIT_CWD ?? process.cwd();
  const directory = resolve(folder, from);
  if (!existsSync(directory)) throw new InputError([{ code: "event-folder", path: from, message: `${from}: found no such folder.` }]);
  const { value: events, notes } = readEventFolder(directory);
  const migrationsDirectory = join(packageRoot, "prisma", "migrations");
  const store = await openStore({ dataDirectory: resolve(folder, data), migrationsDirectory });
  try {
    return { ...(await saveEvents(store, events, { actor: "intake", savedEpochSeconds: Date.now() / 1000 })), notes };
  } finally {
    await store.close();
  }
}

try {
  const options = { data: { type: "string" }, from: { type: "string" }, help: { type: "boolean", short: "h" } } as const;
  const { data, from, help } = parseArgs({ options }).values;
  if (help === true) console.log(USAGE);
  else if (data === undefined) {
    console.error(USAGE);
    process.exitCode = 2;
  } else {
    const { saved, refused, notes } = await intake(data, from);
    for (const { message } of notes) console.error(`Warning: ${message}`);
    console.log(`Saved ${saved.length} ${saved.length === 1 ? "event" : "events"}${saved.length > 0 ? `: ${saved.join(", ")}` : ""}.`);
    for (const sentence of refused) console.error(sentence);
    if (refused.length > 0) process.exitCode = 2;
  }
} catch (error) {
  const wrongCall = error instanceof TypeError && "code" in error && String(error.code).startsWith("ERR_PARSE_ARGS");
  if (!(error instanceof InputError) && !wrongCall) throw error;
  console.error(error.message);
  process.exitCode = 2;
}
