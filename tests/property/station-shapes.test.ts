import fc from "fast-check";
import { expect, test } from "vitest";
import { readShape } from "#lib/contracts/api/input-issues.ts";
import { metresOf, kilometresOf } from "#lib/contracts/api/kilometres.ts";
import { descriptionOf, newStationShape } from "#lib/contracts/api/new-station.ts";
import { stationJson } from "#lib/contracts/api/stations.ts";
import { chosenRows, REGISTER_COLUMNS, registerRow } from "#lib/presentation/register-rows.ts";
import { describedStations } from "#tests/support/described-stations.ts";

/** The same value with its numbers to 13 digits, which is a millisecond for times. */
function toMilliseconds(value: unknown): unknown {
  return JSON.parse(JSON.stringify(value, (_, part: unknown) => (typeof part === "number" ? Number(part.toPrecision(13)) : part)));
}

test("what the interface gives of a station can be sent back and describes the same one", () => {
  fc.assert(
    fc.property(describedStations, ([station]) => {
      if (station === undefined) return;
      // Lengths and times of the digits that people write; the shape bounds them as well.
      const tamed = { ...station, deployments: station.deployments.map((one) => ({ ...one, shelf: [{ lengthMetres: 12_345.6, depthMetres: 40 }] })) };
      const given = stationJson({ ...tamed, revision: 3, arrivalCount: 0, lastReadingEpochSeconds: null });
      const request = Object.fromEntries(Object.entries(given).filter(([key]) => !["id", "arrivals", "lastReading"].includes(key)));
      expect(toMilliseconds(descriptionOf(given.id, readShape(newStationShape, request)))).toStrictEqual(toMilliseconds(tamed));
    }),
  );
});

test("kilometres and metres of up to 15 digits turn into each other and back without a trace", () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 20_000_000_000 }), fc.constantFrom(0, 1, 3), (digits, decimals) => {
      const metres = digits / 10 ** decimals;
      expect(metresOf(kilometresOf(metres))).toBe(metres);
    }),
  );
});

test("the register's rows are those that hold all words, in the order asked for", () => {
  fc.assert(
    fc.property(describedStations, fc.constantFrom(...REGISTER_COLUMNS), fc.boolean(), (stations, column, isDescending) => {
      const rows = stations.map((station) => registerRow({ ...station, arrivalCount: station.id.length, lastReadingEpochSeconds: null })).filter((row) => row !== null);
      const order = { column, isDescending };
      const all = chosenRows(rows, { filter: "", order });
      expect(new Set(all)).toStrictEqual(new Set(rows));
      // Turned round, the order is the other one wherever two rows differ; alike ones keep theirs.
      if (column === "id") expect(chosenRows(rows, { filter: "", order: { column, isDescending: !isDescending } })).toStrictEqual(all.toReversed());
      if (column === "arrivals") expect(all.map(({ arrivalCount }) => arrivalCount)).toStrictEqual(rows.map(({ arrivalCount }) => arrivalCount).sort((a, b) => (isDescending ? b - a : a - b)));
      const [first] = rows;
      if (first !== undefined) expect(chosenRows(rows, { filter: ` ${first.id.toUpperCase()} `, order })).toContain(first);
      expect(chosenRows(rows, { filter: "\u0001", order })).toStrictEqual([]);
    }),
  );
});
