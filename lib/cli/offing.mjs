#!/usr/bin/env node
// The command's door. It needs nothing but what `npm ci` installs.
import { fileURLToPath } from "node:url";
import { loadCommand } from "./load-command.mjs";

const packageRoot = fileURLToPath(new URL("../../", import.meta.url));
try {
  const { main } = await loadCommand(packageRoot);
  main({ packageRoot });
} catch (error) {
  if (error.code !== "ERR_MODULE_NOT_FOUND") throw error;
  console.error("The packages that the command leans on are not installed. First: npm ci");
  process.exitCode = 1;
}
