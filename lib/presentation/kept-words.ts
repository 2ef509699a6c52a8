import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { readingChoiceWords } from "./choice-words.ts";
import { listWords, startingSentence } from "./numbers-in-words.ts";
import { positionWords } from "./positions.ts";
import { momentWords } from "./times.ts";

/** An answer that was kept, as a list of them needs it. */
export interface KeptAnswer {
  readonly number: number;
  readonly savedEpochSeconds: number;
  readonly actor: string;
  /** The event's revision that it was made from. */
  readonly eventRevision: number;
  readonly settingsJson: string;
  /** In its maker's words; may be empty. */
  readonly reason: string;
  readonly choices: ObservationChoices;
  readonly outcome: SourceOutcome;
  readonly source: { readonly position: Position; readonly originEpochSeconds: number } | null;
}

export interface KeptWords {
  readonly what: string;
  readonly who: string;
  /** Null where no station was. */
  readonly leftOut: string | null;
  /** What was chosen of the readings; null where all were used as they were brought in. */
  readonly readings: string | null;
}

export function keptWords(kept: KeptAnswer, stations: readonly NumberedStation[]): KeptWords {
  const { savedEpochSeconds, actor, choices } = kept;
  const readings = readingChoiceWords(choices);
  return {
    what: keptPlaceWords(kept),
    who: `${momentWords(savedEpochSeconds)}, ${actor}`,
    leftOut: leftOutWords(choices, stations),
    readings: readings === null ? null : `${startingSentence(readings)}.`,
  };
}

/** "Left out: 4 Thornholm."; null where no station was. */
export function leftOutWords({ leftOutStationIds }: Pick<ObservationChoices, "leftOutStationIds">, stations: readonly NumberedStation[]): string | null {
  const out = stations.filter(({ id }) => leftOutStationIds.includes(id)).map(({ number, name }) => `${number}\u00a0${name}`);
  return out.length === 0 ? null : `Left out: ${listWords(out)}.`;
}

/** In the words of the answer's own headline. */
export function keptPlaceWords({ outcome, source }: Pick<KeptAnswer, "outcome" | "source">): string {
  switch (outcome) {
    case "located":
      return source === null ? "No place yet" : placeWords(source);
    case "several":
      return source === null ? "Not one place" : `Not surely one place; most probable ${placeWords(source)}`;
    case "ring-only":
    case "too-few":
      return "Distance only";
    case "no-agreement":
      return "No common source";
  }
}

/** To the hour: the list does not know how well each time is known, and none is known better by much. */
function placeWords({ position, originEpochSeconds }: NonNullable<KeptAnswer["source"]>): string {
  return `${positionWords(position)}, ${momentWords(Math.round(originEpochSeconds / SECONDS_PER_HOUR) * SECONDS_PER_HOUR)}`;
}
