/** `npm run readme:calls`: writes into README.md what its worked calls print. Read the difference before it is kept. */
import { readFileSync, writeFileSync } from "node:fs";
import { withPrinted } from "./readme-calls.ts";

writeFileSync("README.md", withPrinted(readFileSync("README.md", "utf8")));
