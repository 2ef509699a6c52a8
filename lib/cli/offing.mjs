#!/usr/bin/env node
// The command's door. It needs nothing but what `npm ci` installs.
import { fileURLToPath } from "node:url";
import { loadCommand } from "./load-command.mjs";

const packageRoot = fileURLToPath(new URL("../../", import.meta.url));
const { main } = await loadCommand(packageRoot);
main({ packageRoot });
