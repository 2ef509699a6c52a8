import { spawn } from "node:child_process";
import { processFamily } from "./process-family.ts";

export interface ServedFolder {
  /** Ends in a slash. */
  readonly address: string;
  /** Of the command that serves; the server is a process that it started. */
  readonly processId: number;
  /** Tells the server to end, and waits until it has. */
  readonly stop: () => Promise<void>;
  /** Ends the server and all that it started where they stand, as a loss of power would. */
  readonly kill: () => Promise<void>;
}

/** The built pages over a data folder, on a free port of this machine. */
export async function serveFolder(dataDirectory: string): Promise<ServedFolder> {
  const server = spawn(process.execPath, ["--import", "tsx", "lib/cli/start.ts", "--port", "0", "--data", dataDirectory], { stdio: ["ignore", "pipe", "inherit"] });
  const ended = new Promise<void>((answer) => {
    server.once("exit", () => {
      answer();
    });
  });
  const processId = server.pid ?? 0;
  const stop = async (): Promise<void> => {
    server.kill("SIGTERM");
    await ended;
  };
  const kill = async (): Promise<void> => {
    for (const { id } of processFamily(processId)) process.kill(id, "SIGKILL");
    await ended;
  };
  let said = "";
  for await (const part of server.stdout) {
    said += String(part);
    const address = /^Offing is at (http:\S+)$/m.exec(said)?.[1];
    if (address !== undefined) return { address, processId, stop, kill };
  }
  await stop();
  throw new Error(`The pages are not served: ${said}`);
}
