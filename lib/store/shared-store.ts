import type { Store } from "./open-store.ts";
import { openStore } from "./open-store.ts";

const KEY = Symbol.for("offing.store");

/**
 * The one store of this process. Next gives pages, routes and start-up code a copy of each module, so a variable of
 * this file would be one of several; the global object is the same for all of them.
 */
export function sharedStore(place: { dataDirectory: string; migrationsDirectory: string }): Promise<Store> {
  const holder = globalThis as unknown as Record<symbol, Promise<Store> | undefined>;
  holder[KEY] ??= openStore(place).catch((error: unknown) => {
    holder[KEY] = undefined; // the next request tries again
    throw error;
  });
  return holder[KEY];
}
