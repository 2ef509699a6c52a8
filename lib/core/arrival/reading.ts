/**
 * What one station saw at one moment: swell of a frequency, arriving at a time, with a standard deviation (1 sigma)
 * for each. `ridge`: the time at which the energy of a frequency peaked. `timed`: the frequency that the waves had at
 * a moment, timed by hand. `row` is where the reading stood in what was handed in, so that messages can name it.
 */
export interface Reading {
  readonly arrivalEpochSeconds: number;
  readonly frequencyHz: number;
  readonly arrivalSigmaSeconds: number;
  readonly frequencySigmaHz: number;
  readonly kind: "ridge" | "timed";
  readonly row: number;
  readonly bearing: Bearing | null;
}

/** A mean direction that the waves come from, clockwise from true north. */
export interface Bearing {
  readonly comesFromDegrees: number;
  readonly sigmaDegrees: number;
}
