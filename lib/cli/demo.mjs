// From a fresh clone to the demo in the browser. It runs before anything is installed, so it uses nothing but what
// comes with Node.
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import { createServer } from "node:net";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("../../", import.meta.url));
const dataDirectory = join(root, ".data", "demo");
const USUAL_PORT = 3000;
const SHOWN_LINES = 40;

const COMPILER_ADVICE = `The database driver (better-sqlite3) could not be installed or loaded on this machine.
It comes ready made for common systems where its download can be reached; elsewhere it is compiled, which needs
a C++ compiler, make and Python 3:
  Debian, Ubuntu    sudo apt-get install build-essential python3
  Fedora            sudo dnf install gcc-c++ make python3
  Alpine            sudo apk add build-base python3
  macOS             xcode-select --install
Then once more: npm run demo
The commands (npm run offing) need no database: they work after npm ci --ignore-scripts.`;

/** Runs a step quietly; what it said is shown only if it fails. */
function attempt(command, args) {
  const result = spawnSync(command, args, { cwd: root, encoding: "utf8", maxBuffer: 1 << 28 });
  const output = `${result.stdout ?? ""}${result.stderr ?? ""}${result.error?.message ?? ""}`;
  return { ok: result.status === 0, output: output.trimEnd().split("\n").slice(-SHOWN_LINES).join("\n") };
}

function step(title, command, args, advise = () => "") {
  const begun = Date.now();
  process.stdout.write(`${title} ... `);
  const { ok, output } = attempt(command, args);
  console.log(ok ? `${((Date.now() - begun) / 1000).toFixed(0)} s` : "failed");
  if (ok) return;
  stop(`\n${output}\n\n${advise(output)}`);
}

function stop(message) {
  console.error(message.trimEnd());
  process.exit(1);
}

const driverLoads = () => attempt(process.execPath, ["-e", 'new (require("better-sqlite3"))(":memory:").close()']).ok;

function isInstalled() {
  const record = join(root, "node_modules", ".package-lock.json");
  return existsSync(record) && statSync(record).mtimeMs >= statSync(join(root, "package-lock.json")).mtimeMs;
}

function install() {
  const isDrivers = (output) => (/better-sqlite3|gyp ERR|node-gyp/.test(output) ? COMPILER_ADVICE : "");
  if (!isInstalled()) step("Installing the packages", "npm", ["ci", "--no-progress"], isDrivers);
  if (driverLoads()) return;
  step("Building the database driver", "npm", ["rebuild", "better-sqlite3", "--foreground-scripts"], () => COMPILER_ADVICE);
  if (!driverLoads()) stop(COMPILER_ADVICE);
}

/** When the last of these files and folders, and of all that they hold, was changed. A file taken away changes its folder. */
function lastChange(paths) {
  const within = (path) => (statSync(path).isDirectory() ? readdirSync(path, { recursive: true, encoding: "utf8" }).map((name) => join(path, name)) : []);
  const all = paths.map((path) => join(root, path)).filter((path) => existsSync(path)).flatMap((path) => [path, ...within(path)]);
  return Math.max(...all.map((path) => statSync(path).mtimeMs));
}

/** Pages are built anew only after something that they are made of has changed. Every other build takes the mark away. */
function build() {
  const mark = join(root, ".next", "built-for-demo");
  const sources = ["app", "lib", "public", "prisma/schema.prisma", "next.config.js", "proxy.ts", "package.json", "package-lock.json"];
  const isCurrent = existsSync(mark) && statSync(mark).mtimeMs >= lastChange(sources);
  if (isCurrent) return;
  step("Building the pages", "npm", ["run", "build"]);
  writeFileSync(mark, "");
}

/** Fills a folder beside the demo's own and moves it there when it is whole. Data that are there already stay. */
function seed() {
  if (existsSync(dataDirectory)) {
    console.log(`The demo's data are kept as they are: ${dataDirectory}`);
    return;
  }
  const unfinished = `${dataDirectory}.unfinished-${process.pid}`;
  mkdirSync(dirname(dataDirectory), { recursive: true });
  process.on("exit", () => rmSync(unfinished, { recursive: true, force: true }));
  step("Saving the demo's events", "npx", ["tsx", "prisma/seed.ts", "--data", unfinished]);
  renameSync(unfinished, dataDirectory);
}

function isFree(port) {
  return new Promise((answer) => {
    const probe = createServer();
    probe.once("error", () => answer(false));
    probe.listen(port, "127.0.0.1", () => probe.close(() => answer(true)));
  });
}

const [major, minor] = process.versions.node.split(".").map(Number);
if (major < 20 || (major === 20 && minor < 19)) stop(`Node 20.19 or later is needed; this is ${process.versions.node}.`);

install();
// Saving the events needs the database code, which the build makes as well.
if (!existsSync(dataDirectory)) step("Preparing the database code", "npm", ["run", "generate"]);
seed();
build();

const port = (await isFree(USUAL_PORT)) ? USUAL_PORT : 0;
if (port === 0) console.log(`Port ${USUAL_PORT} is taken on this machine; another is used.`);
const server = spawn("npx", ["tsx", "lib/cli/start.ts", "--data", dataDirectory, "--port", String(port)], { cwd: root, stdio: "inherit" });
for (const signal of ["SIGINT", "SIGTERM"]) process.on(signal, () => server.kill(signal));
server.once("exit", (code) => process.exit(code ?? 0));
