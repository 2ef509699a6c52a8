/**
 * `keep-until-stopped.ts DIR COUNT`: keeps so many answers of the event gale, which is made if it is missing, and prints
 * the number of each once it is acknowledged. For tests that stop it in the middle.
 */
import { openStore } from "#lib/store/open-store.ts";
import { inventedEvent } from "./invented-event.ts";
import { inventedLocalization } from "./invented-localization.ts";
import { MIGRATIONS_DIRECTORY } from "./migrations-directory.ts";

const [dataDirectory = "", count = "0"] = process.argv.slice(2);
const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
if ((await store.loadEvent("gale")) === null) await store.saveEvent(inventedEvent("gale"));
const [latest] = await store.listLocalizations("gale");
const first = (latest?.number ?? 0) + 1;
for (let number = first; number < first + Number(count); number += 1) console.log(await store.saveLocalization(inventedLocalization("gale", number)));
await store.close();
