import { onTestFinished } from "vitest";
import { openStore } from "#lib/store/open-store.ts";
import type { Store } from "#lib/store/open-store.ts";
import { MIGRATIONS_DIRECTORY } from "./migrations-directory.ts";
import { temporaryDirectory } from "./temporary-directory.ts";

/** A store on a real database file, closed and gone when the test has finished. */
export async function temporaryStore(dataDirectory = temporaryDirectory()): Promise<{ store: Store; dataDirectory: string }> {
  const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
  onTestFinished(() => store.close());
  return { store, dataDirectory };
}
