import { parentPort, workerData } from "node:worker_threads";
import { judgeSeries, prepareBench, type Series } from "../support/coverage/judge.ts";

/** Judges one part of a series apart from the main thread. */
parentPort?.postMessage(judgeSeries(prepareBench(), workerData as Series));
