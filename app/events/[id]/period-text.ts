import { PERIOD_SECONDS } from "#lib/core/arrival/reading-limits.ts";

export const PERIOD_WORDS = `a number of seconds from ${PERIOD_SECONDS.least} to ${PERIOD_SECONDS.most}`;

export function periodText(frequencyHz: number): string {
  return (1 / frequencyHz).toFixed(2);
}

/** Seconds, with a point or a comma before the decimals; null for what is no period of a wave. */
export function parsePeriod(text: string): number | null {
  const written = text.trim().replace(",", ".");
  const value = /^\d+(\.\d+)?$/.test(written) ? Number(written) : Number.NaN;
  return value >= PERIOD_SECONDS.least && value <= PERIOD_SECONDS.most ? value : null;
}
