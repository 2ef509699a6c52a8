import { dayAfter, readDate, readTimeOfDay } from "./clock-time.ts";
import type { HandRow } from "./hand-row.ts";

/**
 * The date that a row probably has where its clock shows an earlier time than the row above: that row's own date, or
 * the day after it where midnight has passed. Null where nothing asks for it. It is offered and never put in.
 */
export function suggestedDate(row: HandRow, above: HandRow | undefined): string | null {
  if (above === undefined) return null;
  const [date, time, dateAbove, timeAbove] = [readDate(row.date), readTimeOfDay(row.time), readDate(above.date), readTimeOfDay(above.time)];
  if (date === null || time === null || dateAbove === null || timeAbove === null) return null;
  // ISO dates and times of day sort as text.
  if (`${date} ${time}` >= `${dateAbove} ${timeAbove}` || row.turn !== null || above.turn !== null) return null;
  return time >= timeAbove ? dateAbove : dayAfter(dateAbove);
}
