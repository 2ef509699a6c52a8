/**
 * `save-until-stopped.ts DIR`: saves one event after another into a data folder, and prints the id of each once it is
 * acknowledged. For tests that stop it in the middle.
 */
import { openStore } from "#lib/store/open-store.ts";
import { inventedEvent } from "./invented-event.ts";
import { MIGRATIONS_DIRECTORY } from "./migrations-directory.ts";

const [dataDirectory = ""] = process.argv.slice(2);
const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
for (let number = 0; ; number += 1) {
  const id = `storm-${String(number).padStart(5, "0")}`;
  await store.saveEvent(inventedEvent(id));
  console.log(id);
}
