import { mkdirSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { demoFiles } from "./demo-scenario.ts";

/** `npm run fixtures:demo`: writes the demo scenario anew. tests/scenarios/demo-scenario.test.ts holds the files to it. */
const folder = fileURLToPath(new URL("../../../fixtures/scenarios/demo/", import.meta.url));
for (const [path, text] of demoFiles()) {
  mkdirSync(dirname(join(folder, path)), { recursive: true });
  writeFileSync(join(folder, path), text);
}
