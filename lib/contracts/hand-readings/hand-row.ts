import { PERIOD_SECONDS } from "#lib/core/arrival/reading-limits.ts";
import { QUALITY_FLAGS, type QualityFlag } from "#lib/core/arrival/quality.ts";
import { timedPeriod } from "#lib/core/arrival/timed-period.ts";
import type { NewReading } from "../api/readings.ts";
import { isoTime } from "../iso-time.ts";
import { momentOf, offsetAt, readDate, readTimeOfDay, type MomentOutcome, type Turn } from "./clock-time.ts";
import { writtenNumber } from "./written-number.ts";

/** One reading as it is being typed: text until it means something. */
export interface HandRow {
  readonly key: number;
  readonly date: string;
  readonly time: string;
  /** Which of two, for a time of day that came twice. */
  readonly turn: Turn | null;
  readonly period: string;
  readonly waves: string;
  readonly seconds: string;
  readonly quality: QualityFlag;
}

export const ROW_FIELDS = ["date", "time", "period", "waves", "seconds"] as const;
export type RowField = (typeof ROW_FIELDS)[number];

export interface RowIssue {
  readonly field: RowField;
  readonly message: string;
}

/** What a row says. */
export interface ReadRow {
  readonly issues: readonly RowIssue[];
  /** As it would be brought in; null while anything is missing or wrong. */
  readonly reading: NewReading | null;
  /** When the clock showed the time; null where that is no one moment. */
  readonly clockEpochSeconds: number | null;
  /** For a time of day that came twice. */
  readonly turns: Extract<MomentOutcome, { kind: "twice" }> | null;
}

export const HAND_QUALITIES = QUALITY_FLAGS.filter((flag) => flag !== 9);

/** Waves that pass in two hours at most, and no count of a lifetime. */
const MOST_WAVES = 1000;
const MOST_COUNT_SECONDS = 7200;

/** Whether nothing was typed that could be lost. The date alone is taken over from the row above. */
export function isBlank(row: HandRow): boolean {
  return [row.time, row.period, row.waves, row.seconds].every((text) => text.trim() === "");
}

/** A row held to what it must say, in clock time of a zone. A count is of the moment at its middle. */
export function readRow(row: HandRow, zone: string): ReadRow {
  const when = readClock(row, zone);
  const what = readPeriod(row);
  const issues = [...when.issues, ...what.issues];
  const { clockEpochSeconds, turns } = when;
  if (issues.length > 0 || clockEpochSeconds === null || what.measured === null) return { issues, reading: null, clockEpochSeconds, turns };
  const { halfCountSeconds, ...measured } = what.measured;
  return { issues, turns, clockEpochSeconds, reading: { time: isoTime(clockEpochSeconds + halfCountSeconds), ...measured, kind: "timed", quality: row.quality } };
}

function readClock(row: HandRow, zone: string): Pick<ReadRow, "issues" | "clockEpochSeconds" | "turns"> {
  const date = readDate(row.date);
  const time = readTimeOfDay(row.time);
  const none = { clockEpochSeconds: null, turns: null };
  const issues: RowIssue[] = [
    ...(date === null ? [{ field: "date" as const, message: row.date.trim() === "" ? "Give the day, year first, such as 2024-02-28." : `“${row.date.trim()}” is no day. Write it year first, such as 2024-02-28.` }] : []),
    ...(time === null ? [{ field: "time" as const, message: row.time.trim() === "" ? "Give the clock time, such as 14:30." : `“${row.time.trim()}” is no time of day. Write hours and minutes, such as 14:30.` }] : []),
  ];
  if (date === null || time === null) return { issues, ...none };
  const outcome = momentOf({ date, time }, zone);
  if (outcome.kind === "moment") return { issues, clockEpochSeconds: outcome.epochSeconds, turns: null };
  if (outcome.kind === "skipped") {
    const { from, to } = outcome;
    const said = from.date === to.date ? `from ${from.time} to ${to.time}` : `from ${from.date} ${from.time} to ${to.date} ${to.time}`;
    const message = `This time did not exist in ${zone}: the clocks went forward ${said}. Look at the time again, or enter it in UTC.`;
    return { issues: [{ field: "time", message }], ...none };
  }
  if (row.turn === null) {
    const [first, second] = [offsetAt(outcome.earlierEpochSeconds, zone), offsetAt(outcome.laterEpochSeconds, zone)];
    const message = `The clocks went back and this time came twice in ${zone}. Say whether it was the first (UTC${first}) or the second (UTC${second}).`;
    return { issues: [{ field: "time", message }], clockEpochSeconds: null, turns: outcome };
  }
  return { issues, clockEpochSeconds: row.turn === "earlier" ? outcome.earlierEpochSeconds : outcome.laterEpochSeconds, turns: outcome };
}

type Measured = Pick<NewReading, "periodSeconds" | "frequencyHz" | "frequencySigmaHz"> & { readonly halfCountSeconds: number };

function readPeriod(row: HandRow): { issues: readonly RowIssue[]; measured: Measured | null } {
  const [hasPeriod, hasWaves, hasSeconds] = [row.period, row.waves, row.seconds].map((text) => text.trim() !== "");
  const wrong = (field: RowField, message: string) => ({ issues: [{ field, message }], measured: null });
  if (hasPeriod && (hasWaves || hasSeconds)) return wrong("period", "Give the period or a count of waves, and not both.");
  if (!hasPeriod && !hasWaves && !hasSeconds) return wrong("period", "Give the period in seconds, or the number of waves and the seconds they took.");
  if (hasPeriod) {
    const periodSeconds = writtenNumber(row.period);
    const { least, most } = PERIOD_SECONDS;
    if (periodSeconds === null || periodSeconds < least || periodSeconds > most) return wrong("period", `“${row.period.trim()}” is no period. Give a number of seconds from ${least} to ${most}.`);
    return { issues: [], measured: { periodSeconds, halfCountSeconds: 0 } };
  }
  return readCount(row);
}

function readCount(row: HandRow): { issues: readonly RowIssue[]; measured: Measured | null } {
  const waves = writtenNumber(row.waves);
  const seconds = writtenNumber(row.seconds);
  const issues: RowIssue[] = [];
  if (waves === null || !Number.isInteger(waves) || waves < 1 || waves > MOST_WAVES) {
    issues.push({ field: "waves", message: row.waves.trim() === "" ? "Give the number of waves as well." : `“${row.waves.trim()}” is no count. Give a whole number of waves from 1 to ${MOST_WAVES}.` });
  }
  if (seconds === null || seconds <= 0 || seconds > MOST_COUNT_SECONDS) {
    issues.push({ field: "seconds", message: row.seconds.trim() === "" ? "Give the seconds that the waves took as well." : `“${row.seconds.trim()}” is no such time. Give a number of seconds above 0 and up to ${MOST_COUNT_SECONDS}.` });
  }
  if (issues.length > 0 || waves === null || seconds === null) return { issues, measured: null };
  const { least, most } = PERIOD_SECONDS;
  if (seconds / waves < least || seconds / waves > most) {
    return { issues: [{ field: "seconds", message: `${waves} waves in ${seconds} s would have a period of ${Number((seconds / waves).toPrecision(3))} s; one from ${least} to ${most} s is taken.` }], measured: null };
  }
  return { issues, measured: { ...timedPeriod({ waves, seconds }), halfCountSeconds: seconds / 2 } };
}
