import { spawn, spawnSync } from "node:child_process";
import type { ChildProcess } from "node:child_process";
import { writeFileSync } from "node:fs";
import { get } from "node:http";
import { createServer } from "node:net";
import { join } from "node:path";
import { setTimeout as pause } from "node:timers/promises";
import { describe, expect, onTestFinished, test } from "vitest";
import { InputError } from "#lib/core/failures/input-error.ts";
import { isOwnHost } from "#lib/http/own-host.ts";
import { openStore } from "#lib/store/open-store.ts";
import { inventedEvent } from "#tests/support/invented-event.ts";
import { MIGRATIONS_DIRECTORY } from "#tests/support/migrations-directory.ts";
import { temporaryDirectory } from "#tests/support/temporary-directory.ts";

const COMMAND = ["--import", "tsx", "lib/cli/start.ts"];

interface Server {
  readonly address: string;
  readonly process: ChildProcess;
  readonly ended: Promise<number | null>;
}

/** Starts the server on a free port, and waits until it has said where it is. */
async function started(dataDirectory: string): Promise<Server> {
  const server = spawn(process.execPath, [...COMMAND, "--data", dataDirectory, "--port", "0"], { stdio: ["ignore", "pipe", "inherit"] });
  const ended = new Promise<number | null>((answer) => {
    server.once("exit", answer);
  });
  onTestFinished(async () => {
    server.kill("SIGTERM");
    await ended;
  });
  let said = "";
  for await (const part of server.stdout) {
    said += String(part);
    const address = /^Offing is at (http:\S+)$/m.exec(said)?.[1];
    if (address !== undefined) return { address, process: server, ended };
  }
  throw new Error(`The server never said where it is: ${said}`);
}

function refusedStart(...args: string[]): { status: number | null; first: string; out: string } {
  const { status, stdout, stderr } = spawnSync(process.execPath, [...COMMAND, ...args], { encoding: "utf8", timeout: 30_000 });
  return { status, out: stdout, first: stderr.split("\n")[0] ?? "" };
}

describe("the server", () => {
  test("serves the data of a folder on this machine alone, holds the folder, and stops when it is told to", async () => {
    const dataDirectory = temporaryDirectory();
    const store = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
    await store.saveEvent(inventedEvent("gale"));
    await store.close();

    const server = await started(dataDirectory);
    expect(new URL(server.address).hostname).toBe("127.0.0.1");
    const response = await fetch(server.address);
    expect(response.status).toBe(200);
    expect(await response.text()).toContain("Storm gale");
    expect(refusedStart("--data", dataDirectory, "--port", "0")).toMatchObject({ status: 2, first: expect.stringContaining("found another program using it") as string });

    server.process.kill("SIGINT");
    expect(await server.ended).toBe(0);
    const again = await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY });
    expect((await again.listEvents()).map(({ id }) => id)).toStrictEqual(["gale"]);
    await again.close();
  });
});

test("a server whose starter is killed ends with it, and lets go of the folder", async () => {
  const dataDirectory = temporaryDirectory();
  const server = await started(dataDirectory);
  server.process.kill("SIGKILL");
  await server.ended;
  const opens = async (): Promise<boolean> => {
    try {
      await (await openStore({ dataDirectory, migrationsDirectory: MIGRATIONS_DIRECTORY })).close();
      return true;
    } catch (error) {
      if (error instanceof InputError) return false;
      throw error;
    }
  };
  // It looks after its starter every second; a busy machine may take longer over it.
  const isOpen = { now: await opens() };
  for (let look = 0; look < 100 && !isOpen.now; look += 1) {
    await pause(100);
    isOpen.now = await opens();
  }
  expect(isOpen.now).toBe(true);
  await expect(fetch(server.address)).rejects.toThrow();
});

describe("the server turns away", () => {
  /** The status and text for a request as it stands: `fetch` would write a Host of its own and mend the path. */
  const ask = (address: string, path: string, host: string): Promise<{ status: number | undefined; text: string }> =>
    new Promise((answer, fail) => {
      const { hostname, port } = new URL(address);
      get({ hostname, port, path, headers: { host } }, (response) => {
        let text = "";
        response.setEncoding("utf8").on("data", (part) => (text += String(part)));
        response.on("end", () => {
          answer({ status: response.statusCode, text });
        });
      }).on("error", fail);
    });

  test("requests for another host, whatever they ask for, and addresses that are no text", async () => {
    const { address } = await started(temporaryDirectory());
    const { host, port } = new URL(address);
    for (const own of [host, "localhost", `LOCALHOST:${port}`, `[::1]:${port}`, "127.0.0.2"]) {
      expect(await ask(address, "/", own), own).toMatchObject({ status: 200 });
    }
    for (const other of ["evil.example", `evil.example:${port}`, "localhost.evil.example", "127.0.0.1.evil.example", "192.0.2.7", "x@localhost"]) {
      expect(await ask(address, "/", other), other).toEqual({ status: 421, text: expect.stringMatching(/^This server answers under .*\.\n$/) as string });
    }
    for (const path of ["/events/gale", "/%65vents/gale", "/?a=/api/", "/_next/../events/gale"]) {
      expect((await ask(address, path, "evil.example")).text, path).not.toContain("<html");
    }
    expect(await ask(address, "/events/%E0%A4%A", host)).toEqual({ status: 400, text: "The address holds a percent sign that spells no letter.\n" });
    expect((await ask(address, "/events/100%25", host)).status).toBe(404);
  });
});

describe("the names of a server", () => {
  test.each([
    ["waves.example", "waves.example:3000", true],
    ["waves.example", "other.example", false],
    ["waves.example", "localhost:3000", true],
    ["fd00::7", "[fd00:0:0::7]:3000", true],
    ["fd00::7", "[fd00::8]:3000", false],
    ["192.0.2.7", "192.0.2.7", true],
    ["0.0.0.0", "192.0.2.7:3000", true],
    ["::", "[fd00::7]", true],
    ["0.0.0.0", "waves.example", false],
    ["::", "7.example", false],
    ["127.0.0.1", null, false],
    ["127.0.0.1", "", false],
    ["127.0.0.1", "a b", false],
  ])("listening at %s, %s is its own: %s", (listensAt, host, own) => {
    expect(isOwnHost(host, listensAt)).toBe(own);
  });
});

describe("a start that cannot be is refused with status 2 and a sentence", () => {
  test("where the port is taken", async () => {
    const other = createServer();
    const port = await new Promise<number>((answer) => {
      other.listen(0, "127.0.0.1", () => {
        const address = other.address();
        answer(typeof address === "object" && address !== null ? address.port : 0);
      });
    });
    onTestFinished(() => {
      other.close();
    });
    expect(refusedStart("--data", temporaryDirectory(), "--port", String(port))).toStrictEqual({
      status: 2,
      out: "",
      first: `Port ${port} of 127.0.0.1 is taken. Name another with --port, or let --port 0 find one.`,
    });
  });

  test("where the address is another machine's", () => {
    // 192.0.2.0/24 is kept for documentation: no machine has an address in it (RFC 5737).
    expect(refusedStart("--data", temporaryDirectory(), "--host", "192.0.2.1").first).toBe(
      "192.0.2.1 is no address of this machine. Name one of its own with --host.",
    );
  });

  test("where the data folder is a file", () => {
    const path = join(temporaryDirectory(), "data");
    writeFileSync(path, "");
    const run = refusedStart("--data", path, "--port", "0");
    expect(run).toMatchObject({ status: 2, first: `Data folder ${path}: found a file in its place; wanted a folder (EEXIST).` });
  });

  test.each([
    [[], "No data folder is named."],
    [["--data", "x", "--port", "99999"], '--port: found "99999"; wanted a whole number from 0 to 65535.'],
    [["--data", "x", "--port", "-1"], /port/],
    [["--folder", "x"], /^Unknown option '--folder'/],
  ])("where the call is wrong: %j", (args, message) => {
    const run = refusedStart(...args);
    expect(run).toMatchObject({ status: 2, out: "" });
    expect(run.first).toMatch(message);
  });
});
