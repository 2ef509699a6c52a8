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
