/** Judges one part of a series apart from the main thread, where the loader of TypeScript has to be set up anew. */
import { parentPort, workerData } from "node:worker_threads";
import { register } from "tsx/esm/api";

register();
const { judgeSeries, prepareBench } = await import("../support/coverage/judge.ts");
parentPort?.postMessage(judgeSeries(prepareBench(), workerData));
