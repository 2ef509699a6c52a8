import { spawn } from "node:child_process";
import { existsSync } from "node:fs";
import { createServer } from "node:net";
import { join, resolve } from "node:path";
import { setTimeout as pause } from "node:timers/promises";
import { fileURLToPath } from "node:url";
import { parseArgs } from "node:util";
import { InputError } from "#lib/core/failures/input-error.ts";
import { openStore } from "#lib/store/open-store.ts";
import { callerFolder } from "./caller-folder.ts";

const USAGE = `npm start -- --data DIR [--port N] [--host H]

  --data DIR   folder that holds the database; made if it is missing
  --port N     3000 unless told otherwise; 0 takes a free one
  --host H     127.0.0.1 unless told otherwise: only this machine can reach it`;

const OK = 200;
/** Statuses that a program ends with when it was told to stop: 128 and the number of the signal. */
const AFTER_SIGINT = 130;
const AFTER_SIGTERM = 143;

const packageRoot = fileURLToPath(new URL("../../", import.meta.url));

interface StartCall {
  readonly dataDirectory: string;
  readonly port: number;
  readonly host: string;
}

function wrongCall(message: string): InputError {
  return cannotStart(`${message}\n\n${USAGE}`);
}

/** The call is well formed, and something about this machine stands against it. */
function cannotStart(message: string): InputError {
  return new InputError([{ code: "cannot-start", path: "", message }]);
}

/** @throws InputError where the call is not as `USAGE` says. */
function readCall(args: readonly string[]): StartCall | "help" {
  const options = {
    data: { type: "string" },
    port: { type: "string", default: "3000" },
    host: { type: "string", default: "127.0.0.1" },
    help: { type: "boolean", short: "h", default: false },
  } as const;
  const values = readOptions(() => parseArgs({ args: [...args], options, strict: true }).values);
  if (values.help) return "help";
  if (values.data === undefined || values.data === "") throw wrongCall("No data folder is named.");
  const port = Number(values.port);
  if (!/^\d+$/.test(values.port) || port > 65_535) {
    throw wrongCall(`--port: found "${values.port}"; wanted a whole number from 0 to 65535.`);
  }
  const folder = callerFolder({ workingFolder: process.cwd(), packageRoot, initFolder: process.env.INIT_CWD });
  return { dataDirectory: resolve(folder, values.data), port, host: values.host };
}

function readOptions<Values>(read: () => Values): Values {
  try {
    return read();
  } catch (error) {
    throw wrongCall(error instanceof Error ? error.message : String(error));
  }
}

/**
 * A port of `host` that nothing listens on: `port` itself, or any where it is 0.
 *
 * @throws InputError where there is none.
 */
function freePort({ host, port }: { host: string; port: number }): Promise<number> {
  return new Promise((answer, refuse) => {
    const probe = createServer();
    probe.once("error", (error: NodeJS.ErrnoException) => {
      refuse(cannotStart(WHY_NOT[error.code ?? ""]?.({ host, port }) ?? `Port ${port} of ${host} cannot be listened on: ${error.message}.`));
    });
    probe.listen(port, host, () => {
      const address = probe.address();
      probe.close(() => {
        answer(typeof address === "object" && address !== null ? address.port : port);
      });
    });
  });
}

const WHY_NOT: Readonly<Record<string, (place: { host: string; port: number }) => string>> = {
  EADDRINUSE: ({ host, port }) => `Port ${port} of ${host} is taken. Name another with --port, or let --port 0 find one.`,
  EADDRNOTAVAIL: ({ host }) => `${host} is no address of this machine. Name one of its own with --host.`,
  ENOTFOUND: ({ host }) => `${host} is no address of this machine. Name one of its own with --host.`,
  EACCES: ({ port }) => `Port ${port} may not be listened on without more rights. Name another with --port.`,
};

/** Status of the server's first page; null while nothing answers. That page opens the data folder, which is then held. */
async function statusAt(address: string): Promise<number | null> {
  try {
    return (await fetch(address)).status;
  } catch {
    return null;
  }
}

/** Serves until it is told to stop; gives the exit status. */
async function serve(call: StartCall): Promise<number> {
  if (!existsSync(join(packageRoot, ".next", "BUILD_ID"))) throw cannotStart("The pages are not built yet. First: npm run build");
  const port = await freePort(call);
  // Pending migrations are applied here, before anyone can ask for a page, and fail where the keeper sees it.
  const migrationsDirectory = join(packageRoot, "prisma", "migrations");
  await (await openStore({ dataDirectory: call.dataDirectory, migrationsDirectory })).close();

  const next = join(packageRoot, "node_modules", "next", "dist", "bin", "next");
  const server = spawn(process.execPath, [next, "start", "--hostname", call.host, "--port", String(port)], {
    cwd: packageRoot,
    // Its standard output is dropped: it would greet with an address of its own.
    stdio: ["ignore", "ignore", "inherit"],
    env: { ...process.env, NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1", OFFING_DATA_DIRECTORY: call.dataDirectory, OFFING_HOST: call.host },
  });
  const ended = new Promise<number>((answer) => {
    server.once("error", () => {
      answer(1);
    });
    server.once("exit", (code, signal) => {
      const toldTo = signal === "SIGINT" || signal === "SIGTERM" || code === AFTER_SIGINT || code === AFTER_SIGTERM;
      answer(toldTo ? 0 : (code ?? 1));
    });
  });
  for (const signal of ["SIGINT", "SIGTERM"] as const) process.on(signal, () => server.kill(signal));

  const name = call.host.includes(":") ? `[${call.host}]` : call.host;
  const address = `http://${name}:${port}/`;
  let status = await statusAt(address);
  while (status === null && server.exitCode === null && server.signalCode === null) {
    await pause(50);
    status = await statusAt(address);
  }
  if (status === null || status === OK) {
    if (status === OK) console.log(`Offing is at ${address}\nData: ${call.dataDirectory}\nCtrl-C stops it.`);
    return ended;
  }
  server.kill("SIGTERM");
  await ended;
  console.error(`The first page answered with status ${status}, so the server was stopped. What went wrong stands above.`);
  return 1;
}

try {
  const call = readCall(process.argv.slice(2));
  if (call === "help") console.log(USAGE);
  else process.exitCode = await serve(call);
} catch (error) {
  if (!(error instanceof InputError)) throw error;
  console.error(error.message);
  process.exitCode = 2;
}
