import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { changedDraft, type DraftChange } from "../../app/readings/draft-changes.ts";
import { stationsLike, type StationChoice } from "../../app/readings/station-choice.ts";
import { EMPTY_DRAFT, readDraft, type Draft } from "#lib/contracts/hand-readings/draft.ts";

const periods = (draft: Draft): string[] => draft.rows.map(({ period }) => period);
const after = (draft: Draft, ...changes: DraftChange[]): Draft => changes.reduce(changedDraft, draft);
const pasted = (period: string, date: string | null = null) => ({ date, time: "14:30", turn: null, period, waves: "", seconds: "" });
const three = after(EMPTY_DRAFT, { kind: "paste", key: 1, rows: [pasted("17", "2031-03-05"), pasted("16"), pasted("15")] });

describe("a draft", () => {
  test("takes pasted rows into a blank row's place, or after one that holds something, with the last date carried on", () => {
    expect(periods(three)).toStrictEqual(["17", "16", "15"]);
    expect(three.rows.map(({ date }) => date)).toStrictEqual(["2031-03-05", "2031-03-05", "2031-03-05"]);
    const [, second] = three.rows;
    expect(periods(after(three, { kind: "paste", key: second?.key ?? 0, rows: [pasted("12")] }))).toStrictEqual(["17", "16", "12", "15"]);
  });

  test("takes a column down from where it was pasted, with rows made for the rest", () => {
    const [, second] = three.rows;
    const filled = after(three, { kind: "column", key: second?.key ?? 0, field: "period", values: ["1", "2", "3"] });
    expect(periods(filled)).toStrictEqual(["17", "1", "2", "3"]);
  });

  test("gives back a removed row where it was, and is never without a row", () => {
    for (const [index, row] of three.rows.entries()) {
      expect(periods(after(three, { kind: "remove", key: row.key }, { kind: "restore", row, index }))).toStrictEqual(periods(three));
    }
    const one = after(EMPTY_DRAFT, { kind: "row", key: 1, part: { period: "14" } });
    const none = after(one, { kind: "remove", key: 1 });
    expect(periods(none)).toStrictEqual([""]);
    expect(periods(after(none, { kind: "restore", row: one.rows[0] ?? three.rows[0] ?? EMPTY_ROW_OF_DRAFT, index: 0 }))).toStrictEqual(["14"]);
  });

  test("forgets which of two times it was once the time is another, and only then", () => {
    const turned = after(three, { kind: "row", key: three.rows[0]?.key ?? 0, part: { turn: "later" } });
    const key = three.rows[0]?.key ?? 0;
    expect(after(turned, { kind: "row", key, part: { period: "18" } }).rows[0]?.turn).toBe("later");
    expect(after(turned, { kind: "row", key, part: { time: "01:45" } }).rows[0]?.turn).toBeNull();
  });

  test("after bringing in keeps event and day for the next station, and nothing of this one", () => {
    const filled = after(three, { kind: "station", part: { id: "wic" } }, { kind: "rest", part: { note: "pier", clock: "station" } }, { kind: "keep", part: { title: "March" } });
    const next = after(filled, { kind: "next", event: "2031-03-05" });
    expect(next).toMatchObject({ station: { way: "stored", id: "" }, note: "", clock: "station", keep: { way: "event", event: "2031-03-05", title: "" } });
    expect(next.rows.map(({ date, time, period }) => [date, time, period])).toStrictEqual([["2031-03-05", "", ""]]);
  });

  test("whatever is done to it has rows with keys of their own, and comes back from the device as it was", () => {
    const anyKey = fc.integer({ min: 1, max: 6 });
    const anyChange: fc.Arbitrary<DraftChange> = fc.oneof(
      fc.record({ kind: fc.constant("add" as const) }),
      fc.record({ kind: fc.constant("remove" as const), key: anyKey }),
      fc.record({ kind: fc.constant("row" as const), key: anyKey, part: fc.record({ period: fc.string({ maxLength: 5 }) }) }),
      fc.record({ kind: fc.constant("paste" as const), key: anyKey, rows: fc.array(fc.constant(pasted("14")), { minLength: 1, maxLength: 3 }) }),
      fc.record({ kind: fc.constant("restore" as const), row: fc.constant(EMPTY_ROW_OF_DRAFT), index: fc.integer({ min: 0, max: 3 }) }),
      fc.record({ kind: fc.constant("column" as const), key: anyKey, field: fc.constant("time" as const), values: fc.array(fc.string({ maxLength: 5 }), { minLength: 1, maxLength: 3 }) }),
    );
    fc.assert(
      fc.property(fc.array(anyChange, { maxLength: 12 }), (changes) => {
        const draft = after(EMPTY_DRAFT, ...changes);
        expect(new Set(draft.rows.map(({ key }) => key)).size).toBe(draft.rows.length);
        expect(readDraft(JSON.stringify(draft))).toStrictEqual(draft);
      }),
    );
  });
});

const EMPTY_ROW_OF_DRAFT = { key: 99, ...pasted("9", ""), date: "", quality: 2 as const };

describe("stations by what they are called", () => {
  const choice = (id: string, name: string, aliases: readonly string[] = []): StationChoice => ({ id, name, aliases, deployments: [], clockCorrections: [] });
  const stations = [choice("ab", "Far Reach", ["wmo:51001"]), choice("reach", "North"), choice("cd", "Reach Head")];
  test.each([
    ["reach", ["reach", "cd", "ab"]],
    ["REACH H", ["cd"]],
    ["51001", ["ab"]],
    ["wmo:5", ["ab"]],
    ["", ["ab", "reach", "cd"]],
    ["nowhere", []],
  ])("are found for %o, those that begin with it first", (text, ids) => {
    expect(stationsLike(stations, text).found.map(({ id }) => id)).toStrictEqual(ids);
  });

  test("beyond fifty are counted and not listed", () => {
    const many = Array.from({ length: 120 }, (_, i) => choice(`s${i}`, `Number ${i}`));
    const { found, more } = stationsLike(many, "number");
    expect([found.length, more]).toStrictEqual([50, 70]);
  });
});
