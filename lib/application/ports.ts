import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";

/** An event as a list shows it. */
export interface EventSummary {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly stationCount: number;
  readonly readingCount: number;
  readonly estimateCount: number;
  /** When the first swell reached a station; null for an event of estimates only. */
  readonly firstArrivalEpochSeconds: number | null;
  readonly savedEpochSeconds: number;
}

export interface StoredEvent {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly observations: EventObservations;
}

export interface EventToSave extends StoredEvent {
  /** Who saves it, for the audit trail. */
  readonly actor: string;
  readonly savedEpochSeconds: number;
}

/** A computed answer that somebody chose to keep, with all that made it. JSON stays text: it is given back as it was. */
export interface LocalizationToSave {
  readonly eventId: string;
  /** The number of the latest localization that its maker had seen; 0 for none. */
  readonly startedFrom: number;
  readonly savedEpochSeconds: number;
  readonly actor: string;
  /** Why it was made, in its maker's words; may be empty. */
  readonly reason: string;
  readonly program: string;
  readonly nodeVersion: string;
  readonly inputDigest: string;
  readonly settingsJson: string;
  readonly inputJson: string;
  /** Ids of stations of the event that were left out. */
  readonly leftOut: readonly string[];
  readonly answerJson: string;
  readonly outcome: SourceOutcome;
  readonly source: { readonly position: Position; readonly originEpochSeconds: number } | null;
}

/** Numbered from 1 within its event, in the order of saving. */
export interface StoredLocalization extends Omit<LocalizationToSave, "startedFrom"> {
  readonly number: number;
}

export type LocalizationSummary = Omit<StoredLocalization, "settingsJson" | "inputJson" | "answerJson">;

/** Where the answers of events are kept, each for good. */
export interface LocalizationStore {
  /** Latest first; empty for an event without any, or that nobody knows. */
  listLocalizations(eventId: string): Promise<LocalizationSummary[]>;

  loadLocalization(eventId: string, number: number): Promise<StoredLocalization | null>;

  /**
   * Keeps an answer as its event's next number, with a line in the audit trail: both or nothing. Gives the number.
   *
   * @throws Refusal `not-found` where nobody knows the event; `conflict` where another was saved since `startedFrom`.
   */
  saveLocalization(localization: LocalizationToSave): Promise<number>;
}

/** Where events are kept. */
export interface EventStore {
  /** Latest swell first; events of estimates only stand last, in order of their ids. */
  listEvents(): Promise<EventSummary[]>;

  /** Null where no event has this id. Deployments come back grouped by station, in the stations' order. */
  loadEvent(id: string): Promise<StoredEvent | null>;

  /**
   * Saves a new event, the stations that it brings, and a line in the audit trail: all of it or nothing.
   *
   * @throws Refusal `conflict` where an event has this id already, or where a station is known with other deployments.
   * @throws InputError `unknown-station` where a reading or an estimate names a station without a deployment.
   */
  saveEvent(event: EventToSave): Promise<void>;
}
