import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { counted } from "./numbers-in-words.ts";
import { momentWords } from "./times.ts";

export interface ArrivalInEvent {
  readonly id: number;
  readonly stationId: string;
  readonly revision: number;
  readonly note: string;
  readonly actor: string;
  readonly savedEpochSeconds: number;
}

export interface ReadingOfArrival {
  readonly arrivalId: number;
}

export interface ArrivalRow {
  readonly id: number;
  readonly name: string;
  readonly what: string;
  readonly who: string;
}

/** The arrivals of an event in words: where, of what, and who brought them in when. */
export function arrivalRows({ arrivals, readings, stations }: { arrivals: readonly ArrivalInEvent[]; readings: readonly ReadingOfArrival[]; stations: readonly NumberedStation[] }): ArrivalRow[] {
  return arrivals.map(({ id, stationId, note, actor, savedEpochSeconds }) => {
    const station = stations.find((one) => one.id === stationId);
    const count = readings.filter(({ arrivalId }) => arrivalId === id).length;
    return {
      id,
      name: station === undefined ? stationId : `${station.number}\u00a0${station.name}`,
      what: count === 0 ? "an estimate" : counted(count, "reading"),
      who: `${momentWords(savedEpochSeconds)}, ${actor}${note === "" ? "" : `: ${note}`}`,
    };
  });
}
