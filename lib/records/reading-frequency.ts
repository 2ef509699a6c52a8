import { FREQUENCY_HZ, PERIOD_SECONDS } from "#lib/core/arrival/reading-limits.ts";
import { inRange, readNumber, zeroOrInRange } from "./cells.ts";
import type { CellPlace } from "./cells.ts";

/** Periods are written to tenths of a second and frequencies to thousandths of a hertz: rounding alone may part them by this. */
const PERIOD_AGREEMENT_FRACTION = 0.02;
/** Errors are written to one or two digits. */
const SIGMA_AGREEMENT_FRACTION = 0.2;

const SECONDS = inRange("seconds", PERIOD_SECONDS);
const HERTZ = inRange("hertz", FREQUENCY_HZ);
const SECONDS_OR_ZERO = zeroOrInRange("seconds", { least: 1e-6, most: PERIOD_SECONDS.most });
const HERTZ_OR_ZERO = zeroOrInRange("hertz", { least: 1e-9, most: FREQUENCY_HZ.most });

/**
 * A row's frequency and its standard deviation, from `frequency_hz` or `period_s` and `frequency_sigma_hz` or
 * `period_sigma_s`, f = 1/T and sigma_f = sigma_T / T^2. Where both of a pair are given they must agree, and the
 * frequency is used. Null, with a problem added, where the row gives none that can be used; a null sigma: none given.
 */
export function readFrequency({ cell }: { cell: (column: string) => CellPlace }): { frequencyHz: number; frequencySigmaHz: number | null } | null {
  const periodSeconds = readNumber(cell("period_s"), SECONDS);
  const givenHz = readNumber(cell("frequency_hz"), HERTZ);
  const periodSigmaSeconds = readNumber(cell("period_sigma_s"), SECONDS_OR_ZERO);
  const givenSigmaHz = readNumber(cell("frequency_sigma_hz"), HERTZ_OR_ZERO);
  if (periodSeconds === null && givenHz === null) {
    reportIfEmpty(cell);
    return null;
  }
  const ofPeriodHz = periodSeconds === null ? null : 1 / periodSeconds;
  const frequencyHz = agreed(cell, { givenHz, ofPeriodHz, fraction: PERIOD_AGREEMENT_FRACTION, columns: ["frequency_hz", "period_s"] });
  if (frequencyHz === null) return null;
  const ofPeriodSigmaHz = periodSigmaSeconds === null ? null : periodSigmaSeconds * frequencyHz * frequencyHz;
  const columns = ["frequency_sigma_hz", "period_sigma_s"] as const;
  const frequencySigmaHz = agreed(cell, { givenHz: givenSigmaHz, ofPeriodHz: ofPeriodSigmaHz, fraction: SIGMA_AGREEMENT_FRACTION, columns });
  return { frequencyHz, frequencySigmaHz };
}

interface Pair {
  readonly givenHz: number | null;
  readonly ofPeriodHz: number | null;
  readonly fraction: number;
  readonly columns: readonly [string, string];
}

function agreed(cell: (column: string) => CellPlace, { givenHz, ofPeriodHz, fraction, columns }: Pair): number | null {
  if (givenHz === null || ofPeriodHz === null) return givenHz ?? ofPeriodHz;
  if (Math.abs(givenHz - ofPeriodHz) <= fraction * Math.max(givenHz, ofPeriodHz)) return givenHz;
  const { table, row, problems } = cell(columns[0]);
  problems.add({
    code: "period-and-frequency",
    row: row.row,
    column: columns[0],
    found: row.cells[table.columns.get(columns[0]) ?? -1] ?? "",
    wanted: `a value that agrees with ${columns[1]} (${Number(ofPeriodHz.toPrecision(4))} Hz), or one of the two alone`,
  });
  return null;
}

/** A cell that held something unusable has been reported already; one more line about it would only confuse. */
function reportIfEmpty(cell: (column: string) => CellPlace): void {
  const { table, row, problems } = cell("period_s");
  const columns = ["period_s", "frequency_hz"].filter((name) => table.columns.has(name));
  if (columns.some((name) => row.cells[table.columns.get(name) ?? -1] !== "")) return;
  const wanted = columns.length === 2 ? "a period or a frequency" : columns[0] === "period_s" ? SECONDS.wanted : HERTZ.wanted;
  problems.add({ code: "empty-cell", row: row.row, column: columns.join(" or "), found: "", wanted });
}
