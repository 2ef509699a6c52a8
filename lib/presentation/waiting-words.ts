import { figure } from "./figures.ts";
import { counted } from "./numbers-in-words.ts";
import { momentWords } from "./times.ts";

interface WaitingArrival {
  readonly stationId: string;
  readonly actor: string;
  readonly savedEpochSeconds: number;
  readonly readings: readonly { readonly reading: { readonly arrivalEpochSeconds: number; readonly frequencyHz: number } }[];
  readonly estimate: { readonly originEpochSeconds: number } | null;
}

/** "Thornholm (tho): first swell 9 Feb 2031 06:00 UTC, 20 to 12 s, 10 readings; brought in 10 Feb 2031 07:00 UTC, somebody" */
export function waitingWords({ stationId, actor, savedEpochSeconds, readings, estimate }: WaitingArrival, name: string): string {
  const times = readings.map(({ reading }) => reading.arrivalEpochSeconds);
  const periods = readings.map(({ reading }) => 1 / reading.frequencyHz);
  const [longest, shortest] = [periods.reduce((a, b) => Math.max(a, b), 0), periods.reduce((a, b) => Math.min(a, b), Infinity)];
  const what =
    readings.length === 0
      ? `an estimate${estimate === null ? "" : ` of a storm at ${momentWords(estimate.originEpochSeconds)}`}`
      : `first swell ${momentWords(times.reduce((a, b) => Math.min(a, b), Infinity))}, ${figure(longest)} to ${figure(shortest)}\u00a0s, ${counted(readings.length, "reading")}`;
  return `${name} (${stationId}): ${what}; brought in ${momentWords(savedEpochSeconds)}, ${actor}`;
}
