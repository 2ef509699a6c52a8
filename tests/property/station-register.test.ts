import fc from "fast-check";
import { expect, test } from "vitest";
import { UNDESCRIBED, type StationDescription } from "#lib/core/arrival/station-description.ts";
import { inOrderOfTime, overlappingSpans } from "#lib/core/arrival/overlapping-spans.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { guarded, unguarded } from "#lib/records/formula-guard.ts";
import { readStationRegister } from "#lib/records/station-register-csv.ts";
import { readStationsCsv } from "#lib/records/stations-csv.ts";
import { writeStationRegister } from "#lib/records/write-station-register.ts";
import { describedStations } from "#tests/support/described-stations.ts";

function readBack(text: string): StationDescription[] {
  return readStationRegister(text, "s.csv").value.stations.map(({ id, deployments, said }) => ({ ...UNDESCRIBED, ...said, id, deployments }));
}

test("a register that was written is read back to the last digit and letter", () => {
  fc.assert(
    fc.property(describedStations, (stations) => {
      expect(readBack(writeStationRegister(stations))).toStrictEqual(stations);
    }),
  );
});

test("it survives a byte order mark, line ends of the other kind, and rows in another order", () => {
  fc.assert(
    fc.property(describedStations.filter((stations) => stations.every(({ note }) => !note.includes("\n"))), (stations) => {
      const [header = "", ...rows] = writeStationRegister(stations).trimEnd().split("\n");
      const turned = ["\uFEFF" + header, ...rows.toReversed(), ""].join("\r\n");
      const byId = (list: readonly StationDescription[]) => list.toSorted((a, b) => (a.id < b.id ? -1 : 1));
      expect(byId(readBack(turned))).toStrictEqual(byId(stations));
    }),
  );
});

test("the command line reads the same deployments from it, and knows all of its columns", () => {
  fc.assert(
    fc.property(describedStations, (stations) => {
      const { value, notes } = readStationsCsv(writeStationRegister(stations), "s.csv");
      expect(value).toStrictEqual(stations.flatMap(({ deployments }) => deployments));
      expect(notes).toStrictEqual([]);
    }),
  );
});

test("no cell of it is what a spreadsheet takes for a formula, but for numbers", () => {
  fc.assert(
    fc.property(fc.oneof(fc.string(), fc.constantFrom("=", "'=", "''+1", "-1", "@x", "'", "''a")), (text) => {
      expect(guarded(text)).not.toMatch(/^[=+\-@]/);
      expect(unguarded(guarded(text))).toBe(text);
    }),
  );
});

test("spans overlap where a moment lies in two of them, whichever way they are listed", () => {
  const end = fc.option(fc.integer({ min: 0, max: 12 }), { nil: null });
  const span = fc.record({ fromEpochSeconds: end, toEpochSeconds: end }).filter(({ fromEpochSeconds, toEpochSeconds }) => (fromEpochSeconds ?? -1) < (toEpochSeconds ?? 99));
  fc.assert(
    fc.property(fc.array(span, { maxLength: 5 }), (spans) => {
      // Looked at moment by moment, halves included, instead of by comparing ends.
      const holders = Array.from({ length: 60 }, (_, half) => half / 2 - 5).map((moment) => spans.filter((one) => (one.fromEpochSeconds ?? -99) <= moment && moment < (one.toEpochSeconds ?? 99)).length);
      expect(overlappingSpans(spans).length > 0).toBe(Math.max(...holders) > 1);
      expect(overlappingSpans(spans.toReversed())).toHaveLength(overlappingSpans(spans).length);
      const starts = inOrderOfTime(spans).map(({ fromEpochSeconds }) => fromEpochSeconds ?? -1);
      expect(starts).toStrictEqual(starts.toSorted((a, b) => a - b));
    }),
  );
});

/** What people and programs do to files: pieces cut out, doubled or written over. */
/** Anywhere alike: drawn as they come, numbers lie near the ends, and every harm would be one of the header. */
const anywhere = fc.integer({ min: 1, max: 99_999 }).map((number) => (number * 0.618_033_988_75) % 1);
const harm = fc.tuple(anywhere, fc.integer({ min: 0, max: 3 }), fc.oneof(fc.string({ maxLength: 6 }), fc.constantFrom("\"", ",", "\n", "-", "e5", "0", ":", " | ", "..", "/", "\u0000", "\ud800", "9999-12-31T23:59-12:00", "1000-01-01T00:00+12:00")));

/** Null where the file is refused, which it has to be by place and in whole sentences. */
function readOrRefused(text: string): StationDescription[] | null {
  try {
    return readBack(text);
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    expect(error.issues.every(({ path, message }) => path.startsWith("s.csv") && message.endsWith("."))).toBe(true);
    return null;
  }
}

test("a harmed file is refused by row, or read as something that can be written and read again", () => {
  let taken = 0;
  fc.assert(
    fc.property(describedStations, fc.array(harm, { minLength: 1, maxLength: 2 }), (stations, harms) => {
      const text = harms.reduce((before, [where, cut, instead]) => {
        const at = Math.floor(where * before.length);
        return before.slice(0, at) + instead + before.slice(at + cut);
      }, writeStationRegister(stations));
      const described = readOrRefused(text);
      if (described === null) return;
      taken += 1;
      expect(JSON.stringify(readBack(writeStationRegister(described)))).toBe(JSON.stringify(described));
    }),
    { numRuns: 400 },
  );
  // Both happen: a test of refusals alone, or of none, would say little.
  expect(taken).toBeGreaterThan(40);
});
