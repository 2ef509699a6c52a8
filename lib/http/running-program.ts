import { join, resolve } from "node:path";
import type { Host } from "#lib/application/host.ts";
import { createLand } from "#lib/application/land.ts";
import type { ArrivalStore, AuditTrail, EventStore, LocalizationStore, StationStore } from "#lib/application/ports.ts";
import { readLandTopology, readProgramName } from "#lib/application/shipped-files.ts";
import { sharedStore } from "#lib/store/shared-store.ts";

/** What pages and routes are lent: where events and their answers are kept, and what a use case needs. */
export interface RunningProgram {
  readonly stations: StationStore;
  readonly events: EventStore;
  readonly arrivals: ArrivalStore;
  readonly localizations: LocalizationStore;
  readonly audit: AuditTrail;
  /** Of the data folder: work that a browser remembers belongs to one of them. */
  readonly storeId: string;
  readonly host: Host;
}

const KEY = Symbol.for("offing.host");

/**
 * The program as this server runs it, the same for every page and route (see shared-store.ts for why it hangs on the
 * global object). `npm start` runs the server from the package's folder and names the data directory.
 *
 * @throws Error where no data directory is named, or where the database cannot be opened.
 */
export async function runningProgram(): Promise<RunningProgram> {
  const packageRoot = process.cwd();
  const dataDirectory = process.env.OFFING_DATA_DIRECTORY;
  if (dataDirectory === undefined || dataDirectory === "") {
    throw new Error("No data directory is named. Start the server with: npm start -- --data DIR");
  }
  const store = await sharedStore({
    dataDirectory: resolve(packageRoot, dataDirectory),
    migrationsDirectory: join(packageRoot, "prisma", "migrations"),
  });
  return { stations: store, events: store, arrivals: store, localizations: store, audit: store, storeId: store.id, host: sharedHost(packageRoot) };
}

function sharedHost(packageRoot: string): Host {
  const holder = globalThis as unknown as Record<symbol, Host | undefined>;
  const host = holder[KEY] ?? {
    program: readProgramName({ packageRoot }),
    land: createLand({ readTopology: () => readLandTopology({ packageRoot }) }),
  };
  holder[KEY] = host;
  return host;
}
