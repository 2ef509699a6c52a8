import { join, resolve } from "node:path";
import { fileURLToPath } from "node:url";
import { parseArgs } from "node:util";
import { openStore } from "#lib/store/open-store.ts";
import { seedEvents } from "./seed-events.ts";

const packageRoot = fileURLToPath(new URL("../", import.meta.url));
const { data } = parseArgs({ options: { data: { type: "string" } } }).values;

if (data === undefined) {
  console.error("tsx prisma/seed.ts --data DIR: fills a new data folder with the demo's invented events.");
  process.exitCode = 2;
} else {
  const store = await openStore({
    dataDirectory: resolve(data),
    migrationsDirectory: join(packageRoot, "prisma", "migrations"),
  });
  try {
    const directory = join(packageRoot, "fixtures", "scenarios", "demo");
    const ids = await seedEvents(store, { directory, savedEpochSeconds: Date.now() / 1000 });
    console.log(`Saved ${ids.length} events: ${ids.join(", ")}.`);
  } finally {
    await store.close();
  }
}
