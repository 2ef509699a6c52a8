/**
 * What is known of a reading's quality, by the flags of QARTOD (IOOS, Manual for Real-Time Quality Control):
 * 1 good, 2 not evaluated, 3 suspect, 4 bad, 9 missing.
 */
export const QUALITY_FLAGS = [1, 2, 3, 4, 9] as const;
export type QualityFlag = (typeof QUALITY_FLAGS)[number];

export const NOT_EVALUATED: QualityFlag = 2;

/** Bad and missing readings are never used; suspect ones where somebody asked for them. */
export function isUsable(quality: QualityFlag, { usesSuspect }: { readonly usesSuspect: boolean }): boolean {
  return quality === 1 || quality === 2 || (quality === 3 && usesSuspect);
}
