import { runningProgram } from "./running-program.ts";

const LOOK_MILLISECONDS = 1000;

/**
 * What a server does before its first request: it reads the world's land, so that the first visitor does not wait for
 * it; and it looks after whoever started it, and ends when that is gone. A server left behind by a starter that was
 * killed would keep the data folder locked and nobody would know by what.
 */
export async function beginServing(): Promise<void> {
  if (process.env.OFFING_DATA_DIRECTORY === undefined) return; // a build, or a server that cannot serve
  const starter = process.ppid;
  setInterval(() => {
    if (process.ppid !== starter) process.exit(1);
  }, LOOK_MILLISECONDS).unref();
  const { host } = await runningProgram();
  host.land.mask();
}
