import { mkdirSync } from "node:fs";
import { join } from "node:path";
import type { EventStore } from "#lib/application/ports.ts";
import { openClient } from "./client.ts";
import type { Prisma } from "./generated/client.ts";
import { listEvents, loadEvent } from "./load-events.ts";
import { migrate } from "./migrate.ts";
import { saveEvent } from "./save-event.ts";
import { createWriteGate } from "./write-gate.ts";

export const DATABASE_FILE = "offing.sqlite";

export interface Store extends EventStore {
  /** Does several writes as one: all of them, or none when `work` throws. Waits for its turn at the write gate. */
  write<T>(work: (transaction: Prisma.TransactionClient) => Promise<T>): Promise<T>;
  close(): Promise<void>;
}

/**
 * Opens the database in `dataDirectory`, made if it is missing, and applies pending migrations first. One process
 * writes to a data directory at a time.
 */
export async function openStore(place: { dataDirectory: string; migrationsDirectory: string }): Promise<Store> {
  mkdirSync(place.dataDirectory, { recursive: true });
  const databasePath = join(place.dataDirectory, DATABASE_FILE);
  migrate({ databasePath, migrationsDirectory: place.migrationsDirectory });

  const writer = await openClient(databasePath);
  const reader = await openClient(databasePath);
  const gate = createWriteGate();
  const write: Store["write"] = (work) =>
    gate.through(() => writer.$transaction(work, { maxWait: 10_000, timeout: 120_000 }));

  return {
    write,
    listEvents: () => listEvents(reader),
    loadEvent: (id) => loadEvent(reader, id),
    saveEvent: (event) => write((transaction) => saveEvent(transaction, event)),
    async close() {
      await gate.settled();
      await Promise.all([writer.$disconnect(), reader.$disconnect()]);
    },
  };
}
