import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { figure, signedFigure } from "./figures.ts";

const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"] as const;

/** A moment in UTC, to the minute: "9 Feb 2031 06:00 UTC". */
export function momentWords(epochSeconds: number): string {
  const moment = new Date(Math.round(epochSeconds / 60) * 60_000);
  return `${dayOf(moment)} ${moment.toISOString().slice(11, 16)}\u00a0UTC`;
}

/** A moment that is not known to the minute, rounded to what its error (1 sigma) leaves: the hour, or ten minutes. */
export function uncertainMomentWords(epochSeconds: number, sigmaSeconds: number): string {
  const stepSeconds = sigmaSeconds >= SECONDS_PER_HOUR ? SECONDS_PER_HOUR : 600;
  return momentWords(Math.round(epochSeconds / stepSeconds) * stepSeconds);
}

/** "± 4 h"; below two hours with a decimal. */
export function plusMinusHours(sigmaSeconds: number): string {
  return `±\u00a0${hoursFigure(sigmaSeconds)}\u00a0h`;
}

export function hoursFigure(seconds: number): string {
  const hours = seconds / SECONDS_PER_HOUR;
  return figure(hours, Math.abs(hours) < 1.95 ? 1 : 0);
}

export function signedHoursFigure(seconds: number): string {
  return signedFigure(seconds / SECONDS_PER_HOUR, 1);
}

/** The day of a moment, UTC. */
export function dayWords(epochSeconds: number): string {
  return dayOf(new Date(epochSeconds * 1000));
}

function dayOf(moment: Date): string {
  return `${moment.getUTCDate()} ${MONTHS[moment.getUTCMonth()] ?? ""} ${moment.getUTCFullYear()}`;
}

/** A moment in UTC as a field holds it: "2031-02-09 06:00", with seconds where it has any. */
export function momentText(epochSeconds: number): string {
  const text = new Date(Math.round(epochSeconds) * 1000).toISOString();
  return `${text.slice(0, 10)} ${text.slice(11, text.slice(17, 19) === "00" ? 16 : 19)}`;
}

/** The moment that such a field names, UTC unless it says an offset itself; null where it names none. */
export function parseMoment(text: string): number | null {
  const trimmed = text.trim();
  const [own, taken] = [parseIsoTime(trimmed), parseIsoTime(`${trimmed}Z`)];
  if (own.kind === "time") return own.epochSeconds;
  return taken.kind === "time" ? taken.epochSeconds : null;
}
