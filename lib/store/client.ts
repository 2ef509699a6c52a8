import { PrismaBetterSqlite3 } from "@prisma/adapter-better-sqlite3";
import { PrismaClient } from "./generated/client.ts";

/** A client with one connection of its own. What it acknowledges has reached the disk (`synchronous = FULL`). */
export async function openClient(databasePath: string): Promise<PrismaClient> {
  const adapter = new PrismaBetterSqlite3({ url: `file:${databasePath}`, timeout: 10_000 });
  // A client has one connection, and its transactions wait for one another: the defaults of a few seconds would turn a
  // rush of readers into faults.
  const client = new PrismaClient({ adapter, transactionOptions: { maxWait: 60_000, timeout: 120_000 } });
  await client.$queryRawUnsafe("PRAGMA synchronous = FULL");
  await client.$queryRawUnsafe("PRAGMA foreign_keys = ON");
  return client;
}
