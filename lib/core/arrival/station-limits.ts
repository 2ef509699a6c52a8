/**
 * What a station's description may hold, wherever it comes from: a file, a form or a program. Lengths are in UTF-16
 * units. They are far above what is in use and keep a stray paste from becoming a station's name.
 */
export const STATION_LETTERS = {
  id: 200,
  name: 200,
  group: 80,
  aliasScheme: 20,
  aliasValue: 80,
  licence: 200,
  attribution: 500,
  contact: 200,
  doi: 200,
  reason: 500,
  note: 4000,
} as const;

export const MOST_ALIASES = 50;
export const MOST_DEPLOYMENTS = 500;
export const MOST_CLOCK_CORRECTIONS = 200;
export const MOST_SHELF_LEGS = 100;
/** Thirty years: a clock that lost its date starts at the beginning of its calendar. */
export const MOST_FAST_BY_SECONDS = 1e9;

export const ALIAS_SCHEME = /^[a-z][a-z0-9-]*$/;
/** Neither spaces, which part aliases from each other, nor control characters. */
export const ALIAS_VALUE = /^[^\s\p{Cc}\p{Cs}]+$/u;
/** Common practice, no source: how DOIs are written since their beginning. */
export const DOI = /^10\.\d{4,9}\/[^\s\p{Cc}\p{Cs}]+$/u;

/** Words that stand in an address for something else than a station. */
const NO_IDS = new Set(["new", ".", ".."]);

export const ID_WANTED = `an id of 1 to ${STATION_LETTERS.id} letters on one line, which may not be "new", "." or ".."`;
export const REASON_WANTED = `why the clock was wrong, in 1 to ${STATION_LETTERS.reason} letters on one line, without the sign |`;

export function isStationId(id: string): boolean {
  return isLine(id, STATION_LETTERS.id) && id === id.trim() && !NO_IDS.has(id);
}

/** Text on one line that shows something, and turns no text beside it round. */
export function isLine(text: string, most: number): boolean {
  const shows = /[^\s\p{Cf}\p{Cc}\p{Cs}]/u.test(text);
  return shows && text.length <= most && !/[\p{Cc}\p{Cs}\u2028\u2029\u202a-\u202e\u2066-\u2069]/u.test(text);
}

/** A reason stands in one cell with others, parted from them by that sign. */
export function isReason(text: string): boolean {
  return isLine(text, STATION_LETTERS.reason) && !text.includes("|");
}

/** Text of any number of lines, or none. */
export function isNote(text: string): boolean {
  return text.length <= STATION_LETTERS.note && !/[\p{Cs}]|(?![\t\r\n])\p{Cc}/u.test(text);
}

/** The same text with one kind of line end and nothing blank around it, so that it is alike however it came in. */
export function tidy(text: string): string {
  return text.replace(/\r\n?/g, "\n").trim();
}

/** A DOI without the address or the word that people write before it. */
export function bareDoi(text: string): string {
  return text.trim().replace(/^(?:https?:\/\/(?:dx\.)?doi\.org\/|doi:\s*)/i, "");
}
