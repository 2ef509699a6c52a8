/**
 * Rows of a readings file for a station that hears a point disturbance: deep water, group speed g / (4 pi f), so
 * frequency f arrives 4 pi f D / g after the start. Written out here so that no test leans on the program's own waves.
 */
export function ridgeRows({ station, distanceKm, start, frequenciesHz, gravity = 9.80665 }: {
  readonly station: string;
  readonly distanceKm: number;
  /** ISO 8601, UTC. */
  readonly start: string;
  readonly frequenciesHz: readonly number[];
  readonly gravity?: number;
}): string[] {
  return frequenciesHz.map((frequencyHz) => {
    const travelSeconds = (4 * Math.PI * frequencyHz * distanceKm * 1000) / gravity;
    const arrival = new Date(Date.parse(start) + travelSeconds * 1000).toISOString();
    return `${station},${arrival},${frequencyHz}`;
  });
}
