import { trueEpochSeconds } from "#lib/core/arrival/clock-correction.ts";
import type { GatheredObservations, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import type { AddedReading, ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { QualityFlag } from "#lib/core/arrival/quality.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";

/** A reading as the panel shows it: in true time, with its frequency as measured. */
export interface ShownReading {
  readonly key: string;
  /** Of those that were brought in; null for one that the analyst added, which stands at `addedAt` among the added. */
  readonly readingId: number | null;
  readonly addedAt: number | null;
  readonly row: number;
  readonly arrivalEpochSeconds: number;
  readonly frequencyHz: number;
  readonly arrivalSigmaSeconds: number;
  readonly frequencySigmaHz: number;
  readonly kind: "ridge" | "timed";
  readonly isDropped: boolean;
  /** Whether its flag keeps it out, whatever is chosen here. */
  readonly isBarred: boolean;
  /** Where it was brought in, if it was moved. */
  readonly broughtIn: { readonly arrivalEpochSeconds: number; readonly frequencyHz: number } | null;
  readonly quality: QualityFlag | null;
  readonly isDownweighted: boolean;
}

/** A station's readings in the order of their rows, the added ones last. */
export function readingRows(of: { observations: GatheredObservations; choices: ObservationChoices; stationId: string; solution: EventSolution }): ShownReading[] {
  const { observations, choices, stationId, solution } = of;
  const outcome = solution.stations.find(({ id }) => id === stationId)?.outcome;
  const downweighted = new Set(outcome?.kind === "fitted" ? outcome.line.downweightedRows : []);
  const own = observations.readings.filter((item) => item.stationId === stationId);
  const lastRow = Math.max(0, ...own.map(({ reading }) => reading.row));
  const added = choices.addedReadings.flatMap((item, addedAt) => (item.stationId === stationId ? [{ item, addedAt }] : []));
  return [
    ...own.map((item) => gathered(item, observations, choices)).map((row) => ({ ...row, isDownweighted: downweighted.has(row.row) && !row.isDropped })),
    ...added.map(({ item, addedAt }, place) => ({ ...fresh(item, addedAt, lastRow + 1 + place), isDownweighted: downweighted.has(lastRow + 1 + place) })),
  ];
}

function gathered(item: GatheredReading, { clockCorrections }: GatheredObservations, choices: ObservationChoices): Omit<ShownReading, "isDownweighted"> {
  const { id, quality, reading, stationId } = item;
  const broughtIn = { arrivalEpochSeconds: trueEpochSeconds(clockCorrections, stationId, reading.arrivalEpochSeconds), frequencyHz: reading.frequencyHz };
  const move = choices.movedReadings.find(({ readingId }) => readingId === id);
  return {
    ...{ key: `reading ${id}`, readingId: id, addedAt: null, row: reading.row, quality },
    arrivalEpochSeconds: move?.arrivalEpochSeconds ?? broughtIn.arrivalEpochSeconds,
    frequencyHz: move?.frequencyHz ?? broughtIn.frequencyHz,
    ...{ arrivalSigmaSeconds: reading.arrivalSigmaSeconds, frequencySigmaHz: reading.frequencySigmaHz, kind: reading.kind },
    isDropped: choices.droppedReadingIds.includes(id),
    isBarred: quality === 4 || quality === 9 || (quality === 3 && !choices.usesSuspect),
    broughtIn: move === undefined ? null : broughtIn,
  };
}

function fresh(added: AddedReading, addedAt: number, row: number): Omit<ShownReading, "isDownweighted"> {
  const { arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind } = added;
  const measured = { arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind };
  return { key: `added ${addedAt}`, readingId: null, addedAt, row, ...measured, isDropped: false, isBarred: false, broughtIn: null, quality: null };
}
