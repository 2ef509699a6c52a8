import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import type { GatheredObservations, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { QualityFlag } from "#lib/core/arrival/quality.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";

/** Who does something and when, for the audit trail. */
export interface Doing {
  readonly actor: string;
  readonly savedEpochSeconds: number;
}

export interface StoredStation extends StationDescription {
  /** Grows with every change. */
  readonly revision: number;
  readonly arrivalCount: number;
  /** On the station's own clock; null where none was brought in. */
  readonly lastReadingEpochSeconds: number | null;
}

export interface StationToSave {
  readonly description: StationDescription;
  /** The revision that its maker had seen; 0 for a new station. */
  readonly startedFrom: number;
}

/** Where stations are described. */
export interface StationStore {
  /** In order of their ids. */
  listStations(): Promise<StoredStation[]>;

  loadStation(id: string): Promise<StoredStation | null>;

  /**
   * Saves all of these stations, or none, each with a line in the audit trail. A group that is named for the first time
   * comes into being.
   *
   * @throws Refusal `conflict` where one was changed or made since `startedFrom`, or where an alias is another station's.
   */
  saveStations(stations: readonly StationToSave[], doing: Doing): Promise<void>;

  /** @throws Refusal `not-found`; `conflict` where it was changed since `startedFrom`, or has arrivals. */
  removeStation(id: string, startedFrom: number, doing: Doing): Promise<void>;
}

/** An event as a list shows it. */
export interface EventSummary {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly revision: number;
  readonly stationCount: number;
  readonly readingCount: number;
  readonly estimateCount: number;
  /** When the first swell reached a station; null for an event of estimates only. */
  readonly firstArrivalEpochSeconds: number | null;
  readonly savedEpochSeconds: number;
  /** The latest answer that was kept; null where none was. */
  readonly latest: Pick<LocalizationSummary, "number" | "outcome" | "source"> | null;
}

/** A station's part in an event; without one it waits. */
export interface ArrivalSummary {
  readonly id: number;
  readonly stationId: string;
  readonly eventId: string | null;
  readonly note: string;
  readonly revision: number;
  readonly actor: string;
  readonly savedEpochSeconds: number;
}

export interface StoredArrival extends ArrivalSummary {
  readonly readings: readonly GatheredReading[];
  readonly estimate: ArrivalEstimate | null;
}

export interface StoredEvent {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  /** Grows with every change of the event; keeping an answer is none. */
  readonly revision: number;
  /** The event that took this one's arrivals. */
  readonly mergedInto: string | null;
  /** In the event's own order. */
  readonly arrivals: readonly ArrivalSummary[];
  readonly observations: GatheredObservations;
}

/** A new event with all that was brought in for it. */
export interface EventBroughtIn {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly observations: EventObservations;
}

export interface EventToSave extends EventBroughtIn, Doing {}

/** A new event of arrivals that are stored already and belong to none. */
export interface EventToOpen {
  /** Null: one is made of the day on which the first of the arrivals came in, or else of today's. */
  readonly id: string | null;
  readonly title: string;
  readonly note: string;
  readonly arrivalIds: readonly number[];
}

/** Where events are kept. Every change of one has a line in the audit trail. */
export interface EventStore {
  /** Latest swell first; events of estimates only stand last, in order of their ids. Without those merged into others. */
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

  /**
   * Makes an event of arrivals that wait for one. Gives its id.
   *
   * @throws Refusal `conflict` where an event has this id already, or where an arrival belongs to another event.
   * @throws InputError `unknown-arrival` for ids that no arrival has.
   */
  openEvent(event: EventToOpen, doing: Doing): Promise<string>;

  /** @throws Refusal `not-found`; `conflict` where it was changed since `startedFrom`. Gives the new revision. */
  editEvent(edit: { readonly id: string; readonly startedFrom: number; readonly title: string; readonly note: string }, doing: Doing): Promise<number>;

  /**
   * Moves all arrivals of `from` to `into`; `from` stays, empty, with the answers that were kept of it.
   *
   * @throws Refusal `not-found`; `conflict` where one of them was changed since, or was itself merged.
   */
  mergeEvents(merge: { readonly into: EventVersion; readonly from: EventVersion }, doing: Doing): Promise<void>;

  /**
   * Makes a new event of some of another's arrivals. Gives its id.
   *
   * @throws Refusal `not-found`; `conflict` where the event was changed since, or the new id is taken.
   * @throws InputError `unknown-arrival` for ids that are none of this event's; `nothing-left` where all would go.
   */
  splitEvent(split: { readonly from: EventVersion; readonly event: EventToOpen }, doing: Doing): Promise<string>;
}

/** An event and the revision of it that somebody had seen. */
export interface EventVersion {
  readonly id: string;
  readonly startedFrom: number;
}

export interface ArrivalToSave {
  readonly stationId: string;
  /** Null: it waits for an event. */
  readonly eventId: string | null;
  readonly note: string;
  readonly readings: readonly { readonly reading: Reading; readonly quality: QualityFlag }[];
  readonly estimate: ArrivalEstimate | null;
}

export interface ArrivalFilter {
  readonly stationId?: string | undefined;
  /** Null: those that wait for an event. */
  readonly eventId?: string | null | undefined;
  /** Those that were brought in after this one. */
  readonly afterId?: number | undefined;
  readonly limit: number;
}

export interface ReadingFilter {
  readonly stationId?: string | undefined;
  readonly afterId?: number | undefined;
  /** On the station's own clock; the first moment counts, the last does not. */
  readonly fromEpochSeconds?: number | undefined;
  readonly toEpochSeconds?: number | undefined;
  readonly limit: number;
}

/** Where arrivals and their readings are kept. Every change of one has a line in the audit trail. */
export interface ArrivalStore {
  /** In the order in which they were brought in. */
  listArrivals(filter: ArrivalFilter): Promise<StoredArrival[]>;

  loadArrival(id: number): Promise<StoredArrival | null>;

  listReadings(filter: ReadingFilter): Promise<GatheredReading[]>;

  /**
   * Gives the arrival's id.
   *
   * @throws Refusal `not-found` for an event that nobody knows; `conflict` where it was merged into another.
   * @throws InputError `unknown-station`.
   */
  saveArrival(arrival: ArrivalToSave, doing: Doing): Promise<number>;

  /**
   * Moves an arrival to another event, or out of its own. Gives its new revision.
   *
   * @throws Refusal `not-found`; `conflict` where it was changed since `startedFrom`, or the event was merged.
   */
  moveArrival(move: { readonly id: number; readonly startedFrom: number; readonly eventId: string | null }, doing: Doing): Promise<number>;

  /** Gives the arrival's new revision. @throws Refusal `not-found`; `conflict` where the arrival was changed since. */
  flagReading(flag: { readonly readingId: number; readonly startedFrom: number; readonly quality: QualityFlag }, doing: Doing): Promise<number>;
}

/** A computed answer that somebody chose to keep, with all that made it. JSON stays text: it is given back as it was. */
export interface LocalizationToSave {
  readonly eventId: string;
  /** The event's revision that it was worked out from. */
  readonly eventRevision: number;
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
  readonly choices: ObservationChoices;
  readonly answerJson: string;
  readonly outcome: SourceOutcome;
  readonly source: { readonly position: Position; readonly originEpochSeconds: number } | null;
}

/** Numbered from 1 within its event, in the order of saving. */
export interface StoredLocalization extends Omit<LocalizationToSave, "startedFrom"> {
  readonly number: number;
}

export type LocalizationSummary = Omit<StoredLocalization, "inputJson" | "answerJson">;

/** Where the answers of events are kept, each for good. */
export interface LocalizationStore {
  /** Latest first; empty for an event without any, or that nobody knows. */
  listLocalizations(eventId: string): Promise<LocalizationSummary[]>;

  loadLocalization(eventId: string, number: number): Promise<StoredLocalization | null>;

  /** @throws Refusal `conflict` where another was saved since `startedFrom`. */
  requireLatest(eventId: string, startedFrom: number): Promise<void>;

  /**
   * Keeps an answer as its event's next number, with a line in the audit trail: both or nothing. Gives the number.
   *
   * @throws Refusal `not-found` where nobody knows the event; `conflict` where another was saved since `startedFrom`, or
   *   the event was changed since `eventRevision`.
   */
  saveLocalization(localization: LocalizationToSave): Promise<number>;
}

export interface AuditLine extends Doing {
  readonly action: string;
  readonly subject: string;
  /** Plain JSON. */
  readonly detail: unknown;
}

export interface AuditTrail {
  /** Latest first. */
  listAudit(filter: { readonly subject: string; readonly limit: number }): Promise<AuditLine[]>;
}
