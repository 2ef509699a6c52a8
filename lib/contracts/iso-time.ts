/** A moment as the public contracts write it: ISO 8601, UTC, to the millisecond. */
export function isoTime(epochSeconds: number): string {
  return new Date(Math.round(epochSeconds * 1000)).toISOString();
}
