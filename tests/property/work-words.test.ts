import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { settingDifferences } from "#lib/contracts/setting-differences.ts";
import { DEFAULT_PUBLIC_SETTINGS, readSettings } from "#lib/contracts/settings.ts";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import { knownChoices } from "#lib/core/arrival/known-choices.ts";
import { NO_CHOICES, type ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { sameChoices } from "#lib/core/arrival/same-choices.ts";
import { auditWords, otherEvent } from "#lib/presentation/audit-words.ts";
import { changeWords, type KeptDifference } from "#lib/presentation/change-words.ts";
import { readingChoiceWords } from "#lib/presentation/choice-words.ts";
import { momentText, parseMoment } from "#lib/presentation/times.ts";
import { INVENTED_DEPLOYMENT, inventedEvent } from "#tests/support/invented-event.ts";
import "#tests/support/property-runs.ts";

describe("a moment in a field", () => {
  test("is read back as it was written, to the second", () => {
    // From the year 1000, the first that the reader of times takes, to 2300.
    fc.assert(fc.property(fc.integer({ min: -30_610_224_000, max: 10_413_792_000 }), (epoch) => {
      expect(parseMoment(momentText(epoch))).toBe(epoch);
    }));
  });

  test("is UTC unless it says otherwise, and nothing but a day and a time", () => {
    expect(momentText(Date.UTC(2031, 1, 9, 6, 0) / 1000)).toBe("2031-02-09 06:00");
    expect(momentText(Date.UTC(2031, 1, 9, 6, 0, 7) / 1000)).toBe("2031-02-09 06:00:07");
    expect(parseMoment(" 2031-02-09 06:00 ")).toBe(Date.UTC(2031, 1, 9, 6) / 1000);
    expect(parseMoment("2031-02-09T06:00-10:00")).toBe(Date.UTC(2031, 1, 9, 16) / 1000);
    for (const text of ["", "06:00", "2031-02-30 06:00", "2031-02-09", "9 Feb 2031 06:00", "2031-02-09 25:00"]) expect(parseMoment(text)).toBeNull();
  });
});

const choices = fc.record<ObservationChoices>({
  leftOutStationIds: fc.uniqueArray(fc.constantFrom("a", "b", "c", "d")),
  droppedReadingIds: fc.uniqueArray(fc.integer({ min: 1, max: 30 })),
  movedReadings: fc.uniqueArray(fc.record({ readingId: fc.integer({ min: 1, max: 30 }), arrivalEpochSeconds: fc.integer(), frequencyHz: fc.double({ min: 0.01, max: 0.2, noNaN: true }) }), { selector: ({ readingId }) => readingId }),
  addedReadings: fc.constant([]),
  usesSuspect: fc.boolean(),
});

describe("choices", () => {
  test("are the same in whatever order they were made, and not where any of them differs", () => {
    fc.assert(fc.property(choices, (some) => {
      const { leftOutStationIds, droppedReadingIds, movedReadings } = some;
      const turned = { usesSuspect: some.usesSuspect, addedReadings: [], movedReadings: movedReadings.toReversed(), droppedReadingIds: droppedReadingIds.toReversed(), leftOutStationIds: leftOutStationIds.toReversed() };
      expect(sameChoices(some, turned)).toBe(true);
      expect(sameChoices(some, { ...turned, usesSuspect: !some.usesSuspect })).toBe(false);
      expect(sameChoices(some, { ...turned, droppedReadingIds: [...droppedReadingIds, 31] })).toBe(false);
      expect(sameChoices(some, { ...turned, leftOutStationIds: [...leftOutStationIds, "e"] })).toBe(false);
      const [move] = movedReadings;
      if (move) expect(sameChoices(some, { ...some, movedReadings: [{ ...move, arrivalEpochSeconds: move.arrivalEpochSeconds + 1 }, ...movedReadings.slice(1)] })).toBe(false);
    }));
  });

  test("keep of an event's stations and readings those that it still has", () => {
    const { observations } = inventedEvent("gale");
    const gathered: GatheredObservations = {
      ...observations,
      readings: observations.readings.map((item, place) => ({ ...item, id: place + 1, arrivalId: 1, quality: 2 as const })),
      estimates: [],
      clockCorrections: [],
    };
    const added = { stationId: "gone", arrivalEpochSeconds: 1, frequencyHz: 0.1, arrivalSigmaSeconds: 1, frequencySigmaHz: 0, kind: "ridge" as const };
    const kept = knownChoices(
      {
        leftOutStationIds: ["north-mole", "gone"],
        droppedReadingIds: [1, 99],
        movedReadings: [{ readingId: 2, arrivalEpochSeconds: 5, frequencyHz: 0.05 }, { readingId: 98, arrivalEpochSeconds: 5, frequencyHz: 0.05 }],
        addedReadings: [added, { ...added, stationId: INVENTED_DEPLOYMENT.stationId }],
        usesSuspect: true,
      },
      gathered,
    );
    expect(kept).toStrictEqual({
      leftOutStationIds: ["north-mole"],
      droppedReadingIds: [1],
      movedReadings: [{ readingId: 2, arrivalEpochSeconds: 5, frequencyHz: 0.05 }],
      addedReadings: [{ ...added, stationId: "north-mole" }],
      usesSuspect: true,
    });
  });

  test("of readings are said in one phrase", () => {
    const move = { readingId: 1, arrivalEpochSeconds: 0, frequencyHz: 0.1 };
    expect(readingChoiceWords(NO_CHOICES)).toBeNull();
    expect(readingChoiceWords({ ...NO_CHOICES, droppedReadingIds: [1] })).toBe("1\u00a0reading dropped");
    expect(readingChoiceWords({ ...NO_CHOICES, droppedReadingIds: [1, 2], movedReadings: [move], usesSuspect: true })).toBe("2\u00a0readings dropped, 1 moved and readings flagged suspect used");
  });
});

describe("what changed between two kept answers", () => {
  const same: KeptDifference = {
    outcome: { before: "located", after: "located" },
    shift: { km: 0, hours: 0 },
    region95Km2: { before: 500_000, after: 500_000 },
    ...{ stationsIn: [], stationsOut: [], readings: [], settings: [] },
    program: { before: "offing 1", after: "offing 1" },
  };
  const said = (part: Partial<KeptDifference>): string => changeWords({ ...same, ...part }, { nameOf: (id) => `1 ${id}`, unit: "km" }).join(" ").replaceAll(/[\u00a0\u202f]/g, " ");

  test("is said a sentence for each thing", () => {
    expect(said({})).toBe("Nothing is different.");
    expect(said({ shift: { km: 123.4, hours: -3 } })).toBe("The most probable source moved 123 km and is 3 h earlier.");
    expect(said({ shift: { km: 12, hours: 0.01 } })).toBe("The most probable source moved 12 km and is at the same time.");
    expect(said({ region95Km2: { before: 450_000, after: 1_234_000 } })).toBe("The 95 % region covers 1 200 000 km², before 450 000 km².");
    expect(said({ outcome: { before: "located", after: "no-agreement" }, shift: null })).toBe("No common source, before: located.");
    expect(said({ stationsIn: ["a"], stationsOut: ["b", "c"] })).toBe("Without 1 b and 1 c. With 1 a.");
    expect(said({ readings: [{ station: "a", changed: 2, in: 1, out: 3 }] })).toBe("1 a: 3 readings out, 1 reading in and 2 changed.");
    expect(said({ program: { before: "offing 1", after: "offing 2" } })).toBe("Worked out by offing 2, before by offing 1.");
  });

  test("names settings by their address", () => {
    expect(settingDifferences(DEFAULT_PUBLIC_SETTINGS, readSettings({}))).toStrictEqual([]);
    const found = settingDifferences(DEFAULT_PUBLIC_SETTINGS, readSettings({ sight: false, spread: { timeHours: 9 } }));
    expect(found).toStrictEqual([{ name: "spread.timeHours", before: 6, after: 9 }, { name: "sight", before: true, after: false }]);
    expect(said({ settings: found })).toBe("Setting spread.timeHours: 9, before 6. Setting sight: false, before true.");
  });
});

test("an event's audit trail says what was done, from the event's own side", () => {
  const said = (action: string, detail: unknown): string => auditWords({ savedEpochSeconds: 0, actor: "me", action, detail }, "petrel").replaceAll("\u00a0", " ");
  const move = { station: "ott", from: "petrel", to: "tern" };
  expect(said("arrival moved", move)).toBe("1 Jan 1970 00:00 UTC, me: moved the arrival at ott to tern.");
  expect(said("arrival moved", { ...move, from: null, to: "petrel" })).toBe("1 Jan 1970 00:00 UTC, me: took in the arrival at ott from those waiting.");
  expect(said("events merged", { into: "petrel", from: "tern", arrivals: [1, 2] })).toBe("1 Jan 1970 00:00 UTC, me: took in 2 arrivals of tern.");
  expect(said("events merged", { into: "heron", from: "petrel", arrivals: [1] })).toBe("1 Jan 1970 00:00 UTC, me: merged it into heron.");
  expect(said("event split", { to: "x", arrivals: [3] })).toBe("1 Jan 1970 00:00 UTC, me: moved 1 arrival to x.");
  expect(said("stations described anew", { stations: ["ott", "lan"] })).toBe("1 Jan 1970 00:00 UTC, me: described ott and lan anew.");
  const other = (detail: unknown): string | null => otherEvent({ savedEpochSeconds: 0, actor: "me", action: "", detail }, "petrel");
  expect([other(move), other({ ...move, to: null }), other({ into: "petrel", from: "tern" }), other({ station: "ott" })]).toStrictEqual(["tern", null, "tern", null]);
  expect(said("localization saved", { number: 4 })).toBe("1 Jan 1970 00:00 UTC, me: kept answer 4.");
  expect(said("reading flagged", { station: "ott", before: 2, after: 4 })).toBe("1 Jan 1970 00:00 UTC, me: flagged a reading of ott bad, not evaluated before.");
});
