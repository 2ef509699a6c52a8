import { Temporal } from "temporal-polyfill";

/** A date and a time of day as somebody read them off a clock, tidied: `2024-02-28`, `14:30` or `14:30:15`. */
export interface ClockReading {
  readonly date: string;
  readonly time: string;
}

/** Which of the two, where the clocks went back and a time of day came twice. */
export type Turn = "earlier" | "later";

/** The moment that a clock showed; or why that is not one moment. */
export type MomentOutcome =
  | { readonly kind: "moment"; readonly epochSeconds: number }
  | { readonly kind: "twice"; readonly earlierEpochSeconds: number; readonly laterEpochSeconds: number }
  /** The clocks went forward over it, from one reading to the other. */
  | { readonly kind: "skipped"; readonly from: ClockReading; readonly to: ClockReading };

const DATE = /^(\d{4})[-/. ]?(\d{1,2})[-/. ]?(\d{1,2})$/;
const TIME = /^(\d{1,2})[:.h ](\d{2})(?::(\d{2}))?$/;
/** Digits alone, as the number pad of a phone writes them: 630 is half past six. */
const TIME_IN_DIGITS = /^(\d{1,2})(\d{2})$/;

/** Null where it is no day of the calendar, year first. */
export function readDate(text: string): string | null {
  const trimmed = text.trim();
  const digits = /^(\d{4})(\d{2})(\d{2})$/.exec(trimmed);
  const found = digits ?? (/^\d+$/.test(trimmed) ? null : DATE.exec(trimmed));
  if (found === null) return null;
  const [, year = "", month = "", day = ""] = found;
  const written = `${year}-${month.padStart(2, "0")}-${day.padStart(2, "0")}`;
  try {
    return Number(year) < 1000 ? null : Temporal.PlainDate.from(written, { overflow: "reject" }).toString();
  } catch {
    return null;
  }
}

/** Null where no clock of 24 hours shows it. */
export function readTimeOfDay(text: string): string | null {
  const found = TIME.exec(text.trim()) ?? TIME_IN_DIGITS.exec(text.trim());
  if (found === null) return null;
  const [, hour = "", minute = "", second] = found;
  if (Number(hour) > 23 || Number(minute) > 59 || Number(second ?? 0) > 59) return null;
  return `${hour.padStart(2, "0")}:${minute}${second === undefined ? "" : `:${second}`}`;
}

/** The moment at which clocks of a zone (IANA name, or UTC) showed this. The zone must be one that the calendar knows. */
export function momentOf({ date, time }: ClockReading, zone: string): MomentOutcome {
  const shown = Temporal.PlainDateTime.from(`${date}T${time}`);
  const earlier = shown.toZonedDateTime(zone, { disambiguation: "earlier" });
  const later = shown.toZonedDateTime(zone, { disambiguation: "later" });
  if (earlier.equals(later)) return { kind: "moment", epochSeconds: earlier.epochMilliseconds / 1000 };
  if (earlier.toPlainDateTime().equals(shown)) {
    return { kind: "twice", earlierEpochSeconds: earlier.epochMilliseconds / 1000, laterEpochSeconds: later.epochMilliseconds / 1000 };
  }
  const change = earlier.getTimeZoneTransition("next") ?? later;
  const before = change.toInstant().toZonedDateTimeISO("UTC").add({ nanoseconds: earlier.offsetNanoseconds });
  return { kind: "skipped", from: written(before.toPlainDateTime()), to: written(change.toPlainDateTime()) };
}

/** What clocks of a zone show at a moment, to the second, and which of two such moments it is. */
export function clockAt(epochSeconds: number, zone: string): ClockReading & { readonly turn: Turn | null } {
  const moment = Temporal.Instant.fromEpochMilliseconds(Math.round(epochSeconds) * 1000).toZonedDateTimeISO(zone);
  const shown = written(moment.toPlainDateTime());
  const outcome = momentOf(shown, zone);
  if (outcome.kind !== "twice") return { ...shown, turn: null };
  return { ...shown, turn: outcome.earlierEpochSeconds === Math.round(epochSeconds) ? "earlier" : "later" };
}

export function dayAfter(date: string): string {
  return Temporal.PlainDate.from(date).add({ days: 1 }).toString();
}

/** Hours and minutes east of UTC at a moment, such as "+10:30". */
export function offsetAt(epochSeconds: number, zone: string): string {
  return Temporal.Instant.fromEpochMilliseconds(epochSeconds * 1000).toZonedDateTimeISO(zone).offset;
}

function written(shown: Temporal.PlainDateTime): ClockReading {
  const time = shown.toPlainTime();
  return { date: shown.toPlainDate().toString(), time: time.toString({ smallestUnit: time.second === 0 ? "minute" : "second" }) };
}
