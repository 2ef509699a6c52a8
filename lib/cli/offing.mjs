#!/usr/bin/env node
// The command's door. It needs nothing but what `npm ci` installs: the program's TypeScript is read as it stands.
import { register } from "tsx/esm/api";

register();
await import("./main.ts");
