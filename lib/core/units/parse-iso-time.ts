const SHAPE =
  /^(\d{4})-(\d{2})-(\d{2})[Tt ](\d{2}):(\d{2})(?::(\d{2})(?:[.,](\d{1,9}))?)?(Z|z|[+-]\d{2}(?::?\d{2})?)?$/;

/** The widest offset in civil use is that of Kiribati, +14:00. */
const WIDEST_OFFSET_MINUTES = 14 * 60;

export type TimeOutcome =
  | { readonly kind: "time"; readonly epochSeconds: number }
  | { readonly kind: "no-offset" | "no-such-time" | "not-a-time" };

/**
 * The moment that an ISO 8601 time names (seconds since 1970-01-01T00:00Z, leap seconds not counted). It must carry
 * `Z` or an offset: a clock time alone names a different moment in each time zone. Days that the calendar does not
 * have are not carried over into the next month.
 */
export function parseIsoTime(text: string): TimeOutcome {
  const match = SHAPE.exec(text);
  if (match === null) return { kind: "not-a-time" };
  const [year = 0, month = 0, day = 0, hour = 0, minute = 0, second = 0] = [1, 2, 3, 4, 5, 6].map((part) => Number(match[part] ?? 0));
  if (year < 1000 || month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return { kind: "no-such-time" };
  if (hour > 23 || minute > 59 || second > 59) return { kind: "no-such-time" };
  const zone = match[8];
  if (zone === undefined) return { kind: "no-offset" };
  const offsetMinutes = parseOffsetMinutes(zone);
  if (offsetMinutes === null) return { kind: "no-such-time" };
  const wholeSeconds = Date.UTC(year, month - 1, day, hour, minute, second) / 1000;
  return { kind: "time", epochSeconds: wholeSeconds - offsetMinutes * 60 + Number(`0.${match[7] ?? 0}`) };
}

function parseOffsetMinutes(zone: string): number | null {
  if (zone === "Z" || zone === "z") return 0;
  const digits = zone.slice(1).replace(":", "").padEnd(4, "0");
  const minutesPart = Number(digits.slice(2));
  const minutes = Number(digits.slice(0, 2)) * 60 + minutesPart;
  if (minutesPart > 59 || minutes > WIDEST_OFFSET_MINUTES) return null;
  return zone.startsWith("-") ? -minutes : minutes;
}

function daysInMonth(year: number, month: number): number {
  if (month === 2) return (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0 ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}
