import type { Spectra } from "#lib/core/signal/spectra.ts";
import { groupedNotes, type LineNotes } from "./line-notes.ts";
import type { ReadResult } from "./note.ts";
import { collectProblems } from "./problems.ts";

/** Written where a buoy has no value. Common practice of the public buoy network, no source. */
const MISSING = 999;
/** Two-digit years: the first buoys of the network reported in the seventies. */
const FIRST_CENTURY_YEAR = 70;
const YEARS = { least: 1970, most: 2100 };
/** m²/Hz; no sea has more. */
const LARGEST_DENSITY = 10_000;

interface Header {
  readonly timeColumns: 4 | 5;
  readonly frequenciesHz: Float64Array;
}

interface OpenPart extends Header {
  readonly epochSeconds: number[];
  readonly density: number[];
}

/**
 * The public buoy network's text of wave spectra: a header `YY MM DD hh [mm]` and the frequencies in Hz, then a row a
 * record in m²/Hz. Old files have years of two digits and no minutes. Where another header stands among the rows the bins
 * changed, and a new part begins. A row that says the same time as an earlier one is left out; rows out of order are put
 * in order; 999 is missing. Each of these is noted by line, and so is a row that cannot be used: it is left out and the
 * rest goes on.
 *
 * @throws InputError where there is no header, its frequencies do not rise, or no row can be used.
 */
export function readBuoySpectraText(text: string, fileName: string): ReadResult<Spectra[]> {
  const problems = collectProblems(fileName);
  const notes = groupedNotes(fileName);
  const parts: OpenPart[] = [];
  const lines = text.replace(/^\uFEFF/, "").split(/\r\n|\r|\n/);
  for (const [index, line] of lines.entries()) {
    const cells = line.split(/[ \t]+/).filter((cell) => cell !== "");
    if (cells.length === 0 || isUnits(cells)) continue;
    const row = index + 1;
    if (isHeader(cells)) {
      const header = readHeader(cells);
      if (header === null) problems.add({ code: "not-a-header", row, found: line, wanted: "YY MM DD hh, mm where there are minutes, and then frequencies in Hz that rise" });
      else if (!isSame(parts.at(-1), header)) parts.push({ ...header, epochSeconds: [], density: [] });
      continue;
    }
    const part = parts.at(-1);
    if (part === undefined) problems.add({ code: "no-header", row, found: line, wanted: "a header YY MM DD hh with the frequencies before the first row" });
    else readRow(part, cells, { row, notes });
    if (part === undefined) break;
  }
  problems.throwIfAny();
  const value = parts.filter(({ epochSeconds }) => epochSeconds.length > 0).map((part) => inOrder(part, notes));
  if (value.length === 0) problems.add({ code: "no-rows", wanted: "at least one row of spectra that can be used", found: "" });
  problems.throwIfAny();
  return { value, notes: [...(value.length > 1 ? [{ code: "bins-changed", message: `${fileName}: its frequencies change; it was read as ${value.length} parts.` }] : []), ...notes.all()] };
}

/** `#yr mo dy hr mn m^2/Hz`: newer files name the units in a line of their own. */
function isUnits(cells: readonly string[]): boolean {
  return /^#?yr$/i.test(cells[0] ?? "");
}

function isHeader(cells: readonly string[]): boolean {
  return /^#?Y{2,4}$/i.test(cells[0] ?? "");
}

function readHeader(cells: readonly string[]): Header | null {
  const timeColumns = /^mm$/i.test(cells[4] ?? "") ? 5 : 4;
  const frequenciesHz = Float64Array.from(cells.slice(timeColumns), readFigure);
  const rises = frequenciesHz.length > 0 && frequenciesHz.every((value, k) => value > (frequenciesHz[k - 1] ?? 0));
  return rises ? { timeColumns, frequenciesHz } : null;
}

function isSame(part: OpenPart | undefined, { timeColumns, frequenciesHz }: Header): boolean {
  if (part?.timeColumns !== timeColumns || part.frequenciesHz.length !== frequenciesHz.length) return false;
  return part.frequenciesHz.every((value, k) => value === frequenciesHz[k]);
}

function readRow(part: OpenPart, cells: readonly string[], { row, notes }: { row: number; notes: LineNotes }): void {
  const { timeColumns, frequenciesHz } = part;
  if (cells.length !== timeColumns + frequenciesHz.length) {
    notes.add("row-width", row, "left out, for they have not as many values as the header");
    return;
  }
  const time = readTime(cells.slice(0, timeColumns));
  if (time === null) {
    notes.add("no-such-time", row, "left out, for their time is none");
    return;
  }
  const values = cells.slice(timeColumns).map(readFigure);
  if (values.some((value) => !(value >= 0 && value <= LARGEST_DENSITY))) {
    notes.add("not-a-density", row, "left out, for a value in them is no density");
    return;
  }
  const densities = values.map((value) => (value === MISSING ? Number.NaN : value));
  if (densities.some(Number.isNaN)) notes.add("missing-values", row, "with values that are missing");
  part.epochSeconds.push(time);
  for (const value of densities) part.density.push(value);
}

function readFigure(cell: string): number {
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(cell) ? Number(cell) : Number.NaN;
}

/** Null for a time that the calendar does not have. */
function readTime(cells: readonly string[]): number | null {
  const [written = NaN, month = NaN, day = NaN, hour = NaN, minute = 0] = cells.map((cell) => (/^\d{1,4}$/.test(cell) ? Number(cell) : Number.NaN));
  const year = (cells[0] ?? "").length <= 2 ? written + (written < FIRST_CENTURY_YEAR ? 2000 : 1900) : written;
  if (!(year >= YEARS.least && year <= YEARS.most && hour <= 23 && minute <= 59)) return null;
  const moment = new Date(Date.UTC(year, month - 1, day, hour, minute));
  return moment.getUTCMonth() === month - 1 && moment.getUTCDate() === day ? moment.getTime() / 1000 : null;
}

function inOrder({ frequenciesHz, epochSeconds, density }: OpenPart, notes: LineNotes): Spectra {
  const width = frequenciesHz.length;
  const places = epochSeconds.map((_, place) => place).sort((a, b) => (epochSeconds[a] ?? 0) - (epochSeconds[b] ?? 0) || a - b);
  const kept = places.filter((place, at) => at === 0 || epochSeconds[place] !== epochSeconds[places[at - 1] ?? -1]);
  const turned = places.filter((place, at) => at > 0 && place < (places[at - 1] ?? 0)).length;
  notes.count("out-of-order", turned, "stood out of order and were put in order");
  notes.count("repeated-times", places.length - kept.length, "said a time that an earlier one had said and were left out");
  return {
    frequenciesHz,
    epochSeconds: Float64Array.from(kept, (place) => epochSeconds[place] ?? NaN),
    densityMetresSquaredPerHz: Float64Array.from(kept.flatMap((place) => density.slice(place * width, (place + 1) * width))),
  };
}
