import type { EventObservations } from "#lib/core/arrival/observations.ts";

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
