/**
 * How far a station sees over water, by bearing: `firstBlockMetres[i]` is the distance along the great circle that
 * leaves the station on bearing `i * stepDegrees` (clockwise from true north) to the first land that blocks it, and
 * Infinity where none does within half the Earth's girth.
 */
export interface SightTable {
  readonly stepDegrees: number;
  readonly firstBlockMetres: Float64Array;
}
