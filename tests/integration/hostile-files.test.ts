import { readdirSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { InputError } from "#lib/core/failures/input-error.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import type { TextFile } from "#lib/records/event-files.ts";
import type { Note } from "#lib/records/note.ts";
import { decodeText } from "#lib/records/text.ts";

const FOLDER = fileURLToPath(new URL("../../fixtures/hostile/", import.meta.url));

/** The stations that hostile readings and arrivals are held against. */
const STATIONS: TextFile = {
  fileName: "stations.csv",
  text: "id,name,latitude,longitude,from,to\nWEST,Invented West,20,200,,\nMOVED,Invented Moved,30,210,2030-01-01T00:00Z,2031-01-01T00:00Z\n",
};

/** What must be said of each file, problem by problem: where, and a word of what was found or wanted. */
const REFUSED: Record<string, readonly RegExp[]> = {
  "readings-nan.csv": [/^readings-nan\.csv, row 3, column period_s: found "NaN"; wanted a number of seconds from 0\.5 to 1000\.$/],
  "readings-infinite.csv": [/row 2, column period_s: found "Infinity"/, /row 3, column period_s: found "1e999"/],
  "readings-negative.csv": [/row 2, column period_s: found "-18"/, /row 3, column period_s: found "0"/],
  "readings-empty-cells.csv": [/row 2, column station: found nothing/, /row 3, column time: found nothing/, /row 4, column period_s: found nothing/],
  "readings-local-time.csv": [/row 2, column time: found "2031-02-09T00:00"; wanted a time that ends in Z or an offset/],
  "readings-impossible-day.csv": [/row 2, column time: found "2031-02-31T00:00Z"; wanted a day.* that exist/, /row 3, column time: found "2031-02-09T25:00Z"/],
  "readings-not-a-time.csv": [/row 2, column time: found "9 February 2031"; wanted an ISO 8601 time/, /row 3, column time: found "1928361600"/],
  "readings-hexadecimal.csv": [/row 2, column period_s: found "0x12"/, /row 3, column period_s: found "16 s"/],
  "readings-decimal-comma.csv": [/row 2, column period_s: found "18,5"; wanted .* with a point and not a comma/, /row 3, column period_s: found "16,0"/],
  "readings-unclosed-quote.csv": [/row \d+: wanted CSV in which every quotation mark/],
  "readings-stray-quote.csv": [/row 2: wanted CSV in which every quotation mark/],
  "readings-no-header.csv": [/row 1: found "WEST, 2031-02-09T00:00Z, 18"; wanted a header that also has the columns station, time/],
  "readings-header-only.csv": [/wanted at least one row under the header/],
  "readings-empty.csv": [/found nothing; wanted a header with station, time/],
  "readings-blank-lines.csv": [/found nothing; wanted a header with station, time/],
  "readings-column-twice.csv": [/row 1, column period_s: wanted each column once/],
  "readings-no-period.csv": [/row 1: wanted a header with the column period_s or frequency_hz/],
  "readings-row-width.csv": [/row 2: wanted 3 cells.* not 2/, /row 3: wanted 3 cells.* not 4/],
  "readings-period-and-frequency.csv": [/row 3, column frequency_hz: found "0.16"; wanted a value that agrees with period_s/],
  "readings-no-error.csv": [/row 2: wanted an error \(standard deviation\) above zero/],
  "readings-odd-bearing.csv": [/row 2, column bearing_deg: found "361"/, /row 3, column bearing_sigma_deg: found "0"/, /row 4, column bearing_deg: found nothing/],
  "readings-unknown-kind.csv": [/row 2, column kind: found "guessed"; wanted one of ridge, timed/],
  "readings-unknown-station.csv": [/row 3, column station: found "NOWHERE"; wanted a station of stations\.csv \(WEST, MOVED\)/],
  "readings-outside-deployment.csv": [/row 2, column time: .* wanted a time within a deployment of MOVED/, /row 3, column time: /],
  "readings-binary.csv": [/zero bytes/],
  "readings-utf16.csv": [/found UTF-16 text; wanted UTF-8/],
  "readings-latin1.csv": [/not UTF-8/],
  "readings-script.csv": [/row 2, column station: found "<script>alert\(1\)<\/script>"/, /row 3, column station: /],
  "readings-long-cell.csv": [/row 2, column time: found "9{60}\.\.\."/],
  "stations-latitude-95.csv": [/row 2, column latitude: found "95"; wanted a latitude of -90 to 90/],
  "stations-longitude-400.csv": [/row 2, column longitude: found "400"; wanted a longitude of -180 to 360/],
  "stations-overlap.csv": [/row 3, column id: found "WEST"; wanted deployments .* overlaps row 2/],
  "stations-same-id-twice.csv": [/row 3, column id: found "WEST"; wanted deployments .* overlaps row 2/],
  "stations-backward-span.csv": [/row 2, column to: found "2030-01-01T00:00Z"; wanted a time after the one in from/],
  "stations-odd-cells.csv": [
    /row 2, column depth_m: found "-5"/,
    /row 2, column sensor: found "radar"; wanted one of surface, pressure, ground/,
    /row 2, column faces_to_deg: found nothing/,
    /row 2, column record_minutes: found "0"/,
    /row 2, column stamp: found "noon"; wanted one of start, middle, end/,
    /row 2, column time_zone: found "Sea\/Nowhere"/,
    /row 2, column shelf: found "12:40;3"; wanted legs seaward/,
  ],
  "stations-no-name.csv": [/row 2, column id: found nothing/, /row 2, column name: found nothing/],
  "stations-missing-column.csv": [/row 1: found "id, name, latitude"; wanted a header that also has the column longitude/],
  "arrivals-odd-cells.csv": [
    /row 2, column distance_km: found "-5"/,
    /row 2, column distance_sigma_km: found "0"/,
    /row 2, column origin_time_sigma_h: found "-1"/,
    /row 2, column correlation: found "1"/,
    /row 3, column origin_time: found "2031-02-09"/,
  ],
  "arrivals-unknown-station.csv": [/row 2, column station: found "NOWHERE"/],
};

/** Files that are odd and can be used: how many readings they hold, and what must be noted. */
const NOTED: Record<string, { readings: number; notes: readonly RegExp[] }> = {
  "readings-semicolons-bom-crlf.csv": { readings: 2, notes: [] },
  "readings-duplicate-rows.csv": { readings: 2, notes: [/repeated rows were used once: row 4 repeats row 2\./] },
  "readings-unknown-column.csv": { readings: 2, notes: [/not known and were not used: "observer"/] },
  "readings-empty-rows.csv": { readings: 2, notes: [/1 row holds nothing and did not count/] },
  "readings-mixed-line-ends.csv": { readings: 3, notes: [] },
};

describe("a broken file is told in words, row by row", () => {
  it("has an expectation for every hostile file", () => {
    const expected = [...Object.keys(REFUSED), ...Object.keys(NOTED)].sort();
    expect(readdirSync(FOLDER).sort()).toEqual(expected);
  });

  it.each(Object.entries(REFUSED))("%s", (fileName, messages) => {
    const { result, seconds } = timed(() => problemsOf(fileName));
    expect(result, result.join("\n")).toHaveLength(messages.length);
    messages.forEach((message, index) => expect(result[index]).toMatch(message));
    expect(seconds).toBeLessThan(1);
  });

  it.each(Object.entries(NOTED))("%s is read, with what there is to note", (fileName, { readings, notes }) => {
    const { value, notes: said } = readHostile(fileName);
    expect(value.readings).toHaveLength(readings);
    const unexpected = said.filter(({ code }) => code !== "default-error").map(({ message }) => message);
    expect(unexpected).toHaveLength(notes.length);
    notes.forEach((note, index) => expect(unexpected[index]).toMatch(note));
  });

  it("reads the same moments from a file with semicolons, offsets and a byte order mark", () => {
    const moments = readHostile("readings-semicolons-bom-crlf.csv").value.readings.map(({ reading }) => reading.arrivalEpochSeconds);
    expect(moments).toEqual([Date.UTC(2031, 1, 9) / 1000, Date.UTC(2031, 1, 9, 8) / 1000]);
  });

  it("shows the first 50 problems of many, and says how many there are", () => {
    const rows = Array.from({ length: 100_000 }, (_, index) => `WEST,2031-02-09T00:${String(index % 60).padStart(2, "0")},${5 + index / 1000}`);
    const { result, seconds } = timed(() => refusal(() => readEventFiles({
      stations: STATIONS, arrivals: null, readings: { fileName: "r.csv", text: `station,time,period_s\n${rows.join("\n")}` },
    })));
    expect(result).toHaveLength(51);
    expect(result[50]).toBe("r.csv: 99950 more problems like these are not shown (100000 in all).");
    expect(seconds).toBeLessThan(4);
  });
});

function readHostile(fileName: string): { value: ReturnType<typeof readEventFiles>["value"]; notes: readonly Note[] } {
  const file = { fileName, text: decodeText(readFileSync(`${FOLDER}${fileName}`), fileName) };
  return readEventFiles({
    stations: fileName.startsWith("stations") ? file : STATIONS,
    readings: fileName.startsWith("readings") ? file : null,
    arrivals: fileName.startsWith("arrivals") ? file : null,
  });
}

function problemsOf(fileName: string): string[] {
  return refusal(() => readHostile(fileName));
}

function refusal(read: () => unknown): string[] {
  try {
    read();
  } catch (error) {
    if (error instanceof InputError) return error.issues.map(({ message }) => message);
    throw error;
  }
  throw new Error("The file was read without a problem.");
}

function timed<Result>(run: () => Result): { result: Result; seconds: number } {
  const start = performance.now();
  const result = run();
  return { result, seconds: (performance.now() - start) / 1000 };
}
