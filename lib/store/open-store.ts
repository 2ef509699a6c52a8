import { mkdirSync } from "node:fs";
import { join } from "node:path";
import type { ArrivalStore, AuditTrail, EventStore, LocalizationStore, StationStore } from "#lib/application/ports.ts";
import { flagReading, listArrivals, listReadings, loadArrival, moveArrival, saveArrival } from "./arrivals.ts";
import { listAudit } from "./audit.ts";
import { asRefusal } from "./cannot-store.ts";
import { openClient } from "./client.ts";
import { editEvent, mergeEvents, openEvent, splitEvent } from "./edit-events.ts";
import type { Prisma, PrismaClient } from "./generated/client.ts";
import { listEvents, loadEvent } from "./load-events.ts";
import { listLocalizations, loadLocalization, requireLatest, saveLocalization } from "./localizations.ts";
import { lockFolder } from "./lock-folder.ts";
import { migrate } from "./migrate.ts";
import { saveEvent } from "./save-event.ts";
import { listStations, removeStation, saveStations } from "./stations.ts";
import { unusableFolder } from "./unusable-folder.ts";
import { createWriteGate } from "./write-gate.ts";

export const DATABASE_FILE = "offing.sqlite";

export interface Store extends StationStore, EventStore, ArrivalStore, LocalizationStore, AuditTrail {
  /** Given to the database when it was made, and kept in every copy of it. */
  readonly id: string;
  /** Does several writes as one: all of them, or none when `work` throws. Waits for its turn at the write gate. */
  write<T>(work: (transaction: Prisma.TransactionClient) => Promise<T>): Promise<T>;
  close(): Promise<void>;
}

interface Place {
  readonly dataDirectory: string;
  readonly migrationsDirectory: string;
}

/**
 * Opens the database in `dataDirectory`, made if it is missing, and applies pending migrations first. One store at a
 * time has a data folder: two that write would each find the other's rows changed under their transactions.
 *
 * @throws InputError where the folder cannot be used or is in use, and as `migrate` says.
 */
export async function openStore(place: Place): Promise<Store> {
  const databasePath = join(place.dataDirectory, DATABASE_FILE);
  const release = takeFolder(place, databasePath);
  const writer = await openClient(databasePath);
  const reader = await openClient(databasePath);
  const gate = createWriteGate();
  const write: Store["write"] = (work) =>
    gate.through(() => writer.$transaction(work)).catch((error: unknown) => {
      throw asRefusal(error);
    });

  return {
    id: await readId(reader),
    write,
    listStations: () => listStations(reader),
    loadStation: async (id) => (await listStations(reader, id))[0] ?? null,
    saveStations: (stations, doing) => write((transaction) => saveStations(transaction, stations, doing)),
    removeStation: (id, startedFrom, doing) => write((transaction) => removeStation(transaction, id, startedFrom, doing)),
    listEvents: () => listEvents(reader),
    loadEvent: (id) => loadEvent(reader, id),
    saveEvent: (event) => write((transaction) => saveEvent(transaction, event)),
    openEvent: (event, doing) => write((transaction) => openEvent(transaction, event, doing)),
    editEvent: (edit, doing) => write((transaction) => editEvent(transaction, edit, doing)),
    mergeEvents: (merge, doing) => write((transaction) => mergeEvents(transaction, merge, doing)),
    splitEvent: (split, doing) => write((transaction) => splitEvent(transaction, split, doing)),
    listArrivals: (filter) => listArrivals(reader, filter),
    loadArrival: (id) => loadArrival(reader, id),
    listReadings: (filter) => listReadings(reader, filter),
    saveArrival: (arrival, doing) => write((transaction) => saveArrival(transaction, arrival, doing)),
    moveArrival: (move, doing) => write((transaction) => moveArrival(transaction, move, doing)),
    flagReading: (flag, doing) => write((transaction) => flagReading(transaction, flag, doing)),
    listLocalizations: (eventId) => listLocalizations(reader, eventId),
    loadLocalization: (eventId, number) => loadLocalization(reader, eventId, number),
    requireLatest: (eventId, startedFrom) => requireLatest(reader, eventId, startedFrom),
    saveLocalization: (localization) => write((transaction) => saveLocalization(transaction, localization)),
    listAudit: (filter) => listAudit(reader, filter),
    async close() {
      await gate.settled();
      await Promise.all([writer.$disconnect(), reader.$disconnect()]);
      release();
    },
  };
}

/** The first migration's own: it is drawn by chance when a database is made. */
async function readId(reader: PrismaClient): Promise<string> {
  const [first] = await reader.$queryRaw<{ id: string }[]>`SELECT id FROM "_prisma_migrations" ORDER BY started_at, migration_name LIMIT 1`;
  if (first === undefined) throw new Error("A database that was opened has migrations.");
  return first.id;
}

/** Locks the folder and brings its database up to date; gives what lets go of the folder. */
function takeFolder({ dataDirectory, migrationsDirectory }: Place, databasePath: string): () => void {
  try {
    mkdirSync(dataDirectory, { recursive: true });
    const release = lockFolder(dataDirectory);
    try {
      migrate({ databasePath, migrationsDirectory });
    } catch (error) {
      release();
      throw error;
    }
    return release;
  } catch (error) {
    throw unusableFolder(error, dataDirectory) ?? error;
  }
}
