import type { ClockCorrection } from "#lib/core/arrival/gathered-observations.ts";
import { inOrderOfTime, overlappingSpans } from "#lib/core/arrival/overlapping-spans.ts";
import type { StationAlias } from "#lib/core/arrival/station-description.ts";
import {
  ALIAS_SCHEME, ALIAS_VALUE, bareDoi, DOI, isLine, isNote, isReason, MOST_ALIASES, MOST_CLOCK_CORRECTIONS, MOST_FAST_BY_SECONDS,
  STATION_LETTERS, tidy,
} from "#lib/core/arrival/station-limits.ts";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { readText } from "./cells.ts";
import type { CellPlace } from "./cells.ts";
import { unguarded } from "./formula-guard.ts";

/** A line of text, null where the cell is empty. */
export function readLine(place: CellPlace, most: number): string | null {
  const wanted = `text of at most ${most} letters on one line`;
  return readOwn(place, wanted, (text) => (isLine(text, most) ? text : null));
}

/** Text of several lines. */
export function readNote(place: CellPlace): string | null {
  return readOwn(place, `text of at most ${STATION_LETTERS.note} letters`, (text) => (isNote(text) ? text : null));
}

export function readDoi(place: CellPlace): string | null {
  return readOwn(place, "a DOI such as 10.1234/buoys.2024", (text) => {
    const doi = bareDoi(text);
    return DOI.test(doi) && doi.length <= STATION_LETTERS.doi ? doi : null;
  });
}

/** Other names as `scheme:value`, each once. */
export function readAliases(place: CellPlace): StationAlias[] | null {
  const wanted = `at most ${MOST_ALIASES} aliases as scheme:value, each once, separated by spaces, such as wmo:46001 port:OTT-2`;
  return readOwn(place, wanted, (text) => {
    const aliases = text.split(/\s+/).map(readAlias);
    const good = aliases.filter((alias) => alias !== null);
    const distinct = new Set(good.map(({ scheme, value }) => `${scheme}:${value}`));
    return good.length === aliases.length && distinct.size === good.length && good.length <= MOST_ALIASES ? good : null;
  });
}

function readAlias(text: string): StationAlias | null {
  const colon = text.indexOf(":");
  const alias = { scheme: text.slice(0, Math.max(0, colon)).toLowerCase(), value: text.slice(colon + 1) };
  const isGood = ALIAS_SCHEME.test(alias.scheme) && alias.scheme.length <= STATION_LETTERS.aliasScheme && ALIAS_VALUE.test(alias.value) && alias.value.length <= STATION_LETTERS.aliasValue;
  return isGood ? alias : null;
}

const CORRECTIONS_WANTED =
  `at most ${MOST_CLOCK_CORRECTIONS} clock corrections parted by |, each a span of time (an end that is .. is open), by how many seconds the clock was fast, ` +
  "and why, such as 2004-02-01T00:00Z/2004-03-01T00:00Z 3600 log kept in local time";

/** In order of time. */
export function readClockCorrections(place: CellPlace, stationId: string): ClockCorrection[] | null {
  const corrections = readOwn(place, CORRECTIONS_WANTED, (text) => {
    const entries = text.split("|").map((entry) => readCorrection(entry.trim(), stationId));
    const good = entries.filter((entry) => entry !== null);
    return good.length === entries.length && good.length <= MOST_CLOCK_CORRECTIONS ? inOrderOfTime(good) : null;
  });
  if (corrections === null || overlappingSpans(corrections).length === 0) return corrections;
  const found = readText(place, CORRECTIONS_WANTED) ?? "";
  place.problems.add({ code: "overlapping-corrections", row: place.row.row, column: place.column, found, wanted: "clock corrections of which no two overlap in time" });
  return null;
}

function readCorrection(entry: string, stationId: string): ClockCorrection | null {
  const [, from = "", to = "", seconds = "", reason = ""] = /^([^\s/]+)\/([^\s/]+)\s+([+-]?\d+(?:\.\d+)?(?:e[+-]?\d+)?)\s+(.+)$/i.exec(entry) ?? [];
  const [fromEpochSeconds, toEpochSeconds] = [readEnd(from), readEnd(to)];
  const fastBySeconds = Number(seconds);
  if (fromEpochSeconds === undefined || toEpochSeconds === undefined || !isReason(reason)) return null;
  if (fromEpochSeconds !== null && toEpochSeconds !== null && fromEpochSeconds >= toEpochSeconds) return null;
  if (fastBySeconds === 0 || !(Math.abs(fastBySeconds) <= MOST_FAST_BY_SECONDS)) return null;
  return { stationId, fromEpochSeconds, toEpochSeconds, fastBySeconds, reason: tidy(reason) };
}

/** Null where the span is open at this end, undefined where this is neither that nor a time. */
function readEnd(text: string): number | null | undefined {
  if (text === "..") return null;
  const outcome = parseIsoTime(text);
  return outcome.kind === "time" ? outcome.epochSeconds : undefined;
}

/** What `read` makes of the cell's text; null where the cell is empty, or `read` can make nothing of it (then a problem is added). */
function readOwn<Value>(place: CellPlace, wanted: string, read: (text: string) => Value | null): Value | null {
  const cell = readText(place, wanted);
  const text = cell === null ? "" : tidy(unguarded(cell));
  if (text === "") return null;
  const value = read(text);
  if (value === null) place.problems.add({ code: "not-taken", row: place.row.row, column: place.column, found: text, wanted });
  return value;
}
