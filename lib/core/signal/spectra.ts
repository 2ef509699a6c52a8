/**
 * A station's wave spectra on one set of frequencies, as they stand in its record. Values lie flat: that of record i at
 * frequency k stands at i * frequenciesHz.length + k. A value that is missing is NaN.
 */
export interface Spectra {
  /** Rising. */
  readonly frequenciesHz: Float64Array;
  /** What each record's time stamp says, rising; whether it marks the start, middle or end is the station's to say. */
  readonly epochSeconds: Float64Array;
  readonly densityMetresSquaredPerHz: Float64Array;
}
