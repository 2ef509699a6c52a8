/** Where an analyst put a reading, in true time and with its frequency as measured. */
export interface MovedReading {
  readonly readingId: number;
  readonly arrivalEpochSeconds: number;
  readonly frequencyHz: number;
}

/** A reading that an analyst took, in true time and with its frequency as measured. */
export interface AddedReading {
  readonly stationId: string;
  readonly arrivalEpochSeconds: number;
  readonly frequencyHz: number;
  readonly arrivalSigmaSeconds: number;
  readonly frequencySigmaHz: number;
  readonly kind: "ridge" | "timed";
}

/** What an analyst chose to use of an event's observations. What was brought in stays as it is beside it. */
export interface ObservationChoices {
  readonly leftOutStationIds: readonly string[];
  readonly droppedReadingIds: readonly number[];
  readonly movedReadings: readonly MovedReading[];
  readonly addedReadings: readonly AddedReading[];
  /** Whether readings flagged suspect are used. */
  readonly usesSuspect: boolean;
}

export const NO_CHOICES: ObservationChoices = {
  leftOutStationIds: [],
  droppedReadingIds: [],
  movedReadings: [],
  addedReadings: [],
  usesSuspect: false,
};
