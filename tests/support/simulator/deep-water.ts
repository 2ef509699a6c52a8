export const GRAVITY = 9.80665;

/** Seconds that energy of one frequency takes over deep water: distance over the group speed g / (4 pi f). */
export function travelSeconds(wave: { frequencyHz: number; distanceMetres: number; gravity?: number }): number {
  return (wave.distanceMetres * 4 * Math.PI * wave.frequencyHz) / (wave.gravity ?? GRAVITY);
}
