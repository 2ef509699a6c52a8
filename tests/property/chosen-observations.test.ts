import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { choicesFromJson, choicesJson, choicesShape } from "#lib/contracts/api/choices.ts";
import { readShape } from "#lib/contracts/api/input-issues.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import { trueEpochSeconds } from "#lib/core/arrival/clock-correction.ts";
import type { ClockCorrection, GatheredObservations, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import { gatheringNotes } from "#lib/core/arrival/gathering-notes.ts";
import { NO_CHOICES, type AddedReading, type ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { isUsable, QUALITY_FLAGS } from "#lib/core/arrival/quality.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { INVENTED_DEPLOYMENT } from "#tests/support/invented-event.ts";

const STATIONS = ["ash", "birch", "cedar"] as const;
const START = 1_700_000_000;

const station = fc.constantFrom(...STATIONS);
/** To the millisecond, as the public contracts write times. */
const time = fc.integer({ min: 0, max: 10 * 86_400_000 }).map((milliseconds) => START + milliseconds / 1000);
const frequencyHz = fc.double({ min: 0.03, max: 0.12, noNaN: true });
const kind = fc.constantFrom("ridge" as const, "timed" as const);

const gatheredReading = (id: number): fc.Arbitrary<GatheredReading> =>
  fc.record({ stationId: station, time, frequencyHz, kind, quality: fc.constantFrom(...QUALITY_FLAGS), arrivalId: fc.integer({ min: 1, max: 9 }) }).map(({ stationId, time: arrivalEpochSeconds, quality, arrivalId, ...rest }) => ({
    ...{ id, stationId, arrivalId, quality },
    reading: { ...rest, arrivalEpochSeconds, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, row: id, bearing: null },
  }));

/** Spans of one station that do not overlap: between sorted ends, every other one. */
const corrections: fc.Arbitrary<ClockCorrection[]> = fc.tuple(...STATIONS.map((stationId) =>
  fc.tuple(fc.uniqueArray(time, { maxLength: 5 }), fc.boolean(), fc.array(fc.integer({ min: -7200, max: 7200 }).filter((value) => value !== 0), { minLength: 6, maxLength: 6 })).map(([ends, startsOpen, shifts]) => {
    const sorted: (number | null)[] = [...(startsOpen ? [null] : []), ...[...ends].sort((a, b) => a - b), null];
    return sorted.slice(0, -1).flatMap((from, place) => (place % 2 === 0 ? [{ stationId, fromEpochSeconds: from, toEpochSeconds: sorted[place + 1] ?? null, fastBySeconds: shifts[place] ?? 1, reason: "invented" }] : []));
  }),
)).map((lists) => lists.flat());

const gathered: fc.Arbitrary<GatheredObservations> = fc.record({
  readings: fc.integer({ min: 0, max: 25 }).chain((count) => fc.tuple(...Array.from({ length: count }, (_, place) => gatheredReading(place + 1)))),
  clockCorrections: corrections,
}).map((parts) => ({ ...parts, deployments: STATIONS.map((stationId) => ({ ...INVENTED_DEPLOYMENT, stationId })), estimates: [] }));

/** Like objects that are written down, and compare equal to them. */
const PLAIN = { noNullPrototype: true };

const added: fc.Arbitrary<AddedReading> = fc.record(
  {
    ...{ stationId: station, arrivalEpochSeconds: time, frequencyHz, kind },
    ...{ arrivalSigmaSeconds: fc.double({ min: 0.001, max: 86_400, noNaN: true }), frequencySigmaHz: fc.double({ min: 0, max: 0.1, noNaN: true }) },
  },
  PLAIN,
);
const ids = fc.uniqueArray(fc.integer({ min: 1, max: 25 }), { maxLength: 12 });

const choices: fc.Arbitrary<ObservationChoices> = fc.record(
  {
    leftOutStationIds: fc.uniqueArray(station),
    droppedReadingIds: ids,
    movedReadings: ids.chain((moved) => fc.tuple(...moved.map((readingId) => fc.record({ readingId: fc.constant(readingId), arrivalEpochSeconds: time, frequencyHz }, PLAIN)))),
    addedReadings: fc.array(added, { maxLength: 6 }),
    usesSuspect: fc.boolean(),
  },
  PLAIN,
);

describe("the observations that an answer is worked out from", () => {
  test("are the gathered ones that neither a flag nor the analyst ruled out, in their order, and then the added ones", () => {
    fc.assert(fc.property(gathered, choices, (all, chosen) => {
      const used = chosenObservations(all, chosen);
      const stays = ({ stationId }: { stationId: string }) => !chosen.leftOutStationIds.includes(stationId);
      const kept = all.readings.filter((item) => {
        if (!stays(item) || chosen.droppedReadingIds.includes(item.id)) return false;
        if (item.quality === 4 || item.quality === 9) return false;
        return item.quality !== 3 || chosen.usesSuspect;
      });
      const fresh = chosen.addedReadings.filter(stays);
      expect(used.readings.map(({ stationId }) => stationId)).toStrictEqual([...kept, ...fresh].map(({ stationId }) => stationId));
      expect(used.readings.slice(0, kept.length).map(({ reading }) => reading.row)).toStrictEqual(kept.map(({ reading }) => reading.row));
      expect(used.readings.slice(kept.length).map(({ reading: { arrivalEpochSeconds } }) => arrivalEpochSeconds)).toStrictEqual(fresh.map(({ arrivalEpochSeconds }) => arrivalEpochSeconds));
      expect(used.deployments).toBe(all.deployments);
    }));
  });

  test("have what was moved where it was put, in true time, and all else by its clock's known error", () => {
    fc.assert(fc.property(gathered, choices, (all, chosen) => {
      const used = chosenObservations(all, { ...chosen, leftOutStationIds: [], addedReadings: [] });
      for (const { reading } of used.readings) {
        const item = all.readings.find(({ id }) => id === reading.row);
        const move = chosen.movedReadings.find(({ readingId }) => readingId === reading.row);
        const { arrivalEpochSeconds = NaN, frequencyHz: measured = NaN } = item?.reading ?? {};
        const error = all.clockCorrections.find(
          (one) => one.stationId === item?.stationId && arrivalEpochSeconds >= (one.fromEpochSeconds ?? -Infinity) && arrivalEpochSeconds < (one.toEpochSeconds ?? Infinity),
        );
        expect(reading.arrivalEpochSeconds).toBe(move?.arrivalEpochSeconds ?? arrivalEpochSeconds - (error?.fastBySeconds ?? 0));
        expect(reading.frequencyHz).toBe(move?.frequencyHz ?? measured);
        expect({ ...reading, arrivalEpochSeconds: 0, frequencyHz: 0 }).toStrictEqual({ ...item?.reading, arrivalEpochSeconds: 0, frequencyHz: 0 });
      }
    }));
  });

  test("give no two readings of a station one row", () => {
    fc.assert(fc.property(gathered, choices, (all, chosen) => {
      const places = chosenObservations(all, chosen).readings.map(({ stationId, reading }) => `${stationId} ${reading.row}`);
      expect(new Set(places).size).toBe(places.length);
    }));
  });

  test("are all that was gathered where all is good, every clock right and nothing was chosen; and do not hang on what else is stored", () => {
    fc.assert(fc.property(gathered, (all) => {
      const good = { ...all, clockCorrections: [], readings: all.readings.map((item) => ({ ...item, quality: 2 as const })) };
      expect(chosenObservations(good, NO_CHOICES).readings).toStrictEqual(good.readings.map(({ stationId, reading }) => ({ stationId, reading })));
      expect(gatheringNotes(good, NO_CHOICES)).toStrictEqual([]);
    }));
  });
});

describe("the true time of a moment on a clock", () => {
  test("is the clock's less what it was fast by, from the first moment of a span to before its last", () => {
    const span = { stationId: "ash", fromEpochSeconds: 100, toEpochSeconds: 200, fastBySeconds: 30, reason: "log" };
    const of = (moment: number) => trueEpochSeconds([span], "ash", moment);
    expect([of(99.999), of(100), of(199.999), of(200)].map((moment) => Number(moment.toFixed(3)))).toStrictEqual([99.999, 70, 169.999, 200]);
    expect(trueEpochSeconds([span], "birch", 150)).toBe(150);
    expect(trueEpochSeconds([{ ...span, fromEpochSeconds: null, toEpochSeconds: null, fastBySeconds: -60 }], "ash", 0)).toBe(60);
  });

  test("is the same whatever is said of other stations, in whatever order", () => {
    fc.assert(fc.property(corrections, station, time, (all, stationId, moment) => {
      const own = all.filter((one) => one.stationId === stationId);
      expect(trueEpochSeconds(all, stationId, moment)).toBe(trueEpochSeconds([...own].reverse(), stationId, moment));
    }));
  });

  test("moves all of a clock's times alike within a span", () => {
    fc.assert(fc.property(fc.integer({ min: -7200, max: 7200 }), time, time, (fastBySeconds, a, b) => {
      const always = [{ stationId: "ash", fromEpochSeconds: null, toEpochSeconds: null, fastBySeconds, reason: "log" }];
      const between = trueEpochSeconds(always, "ash", a) - trueEpochSeconds(always, "ash", b);
      expectWithin(between, a - b, { absolute: 1e-6, unit: "s", because: "sums of numbers of 1e9 keep 1e-7" });
    }));
  });
});

describe("a quality flag", () => {
  test.each([[1, true, true], [2, true, true], [3, false, true], [4, false, false], [9, false, false]] as const)("of %i is used: %s, and where suspect ones were asked for: %s", (flag, plainly, asked) => {
    expect([isUsable(flag, { usesSuspect: false }), isUsable(flag, { usesSuspect: true })]).toStrictEqual([plainly, asked]);
  });
});

describe("choices as JSON", () => {
  test("come back as they were, to the millisecond, and pass the interface's own shape", () => {
    fc.assert(fc.property(choices, (chosen) => {
      const written: unknown = JSON.parse(JSON.stringify(choicesJson(chosen)));
      expect(choicesFromJson(readShape(choicesShape, written))).toStrictEqual(chosen);
    }));
  });

  test("round a time between two milliseconds, and keep a period as its frequency", () => {
    const read = choicesFromJson({ moved: [{ reading: 1, time: "2024-02-28T14:30:00.1239Z", periodSeconds: 12.5 }] });
    const [moved] = read.movedReadings;
    expect(moved?.frequencyHz).toBe(0.08);
    expect(choicesJson(read).moved).toStrictEqual([{ reading: 1, time: "2024-02-28T14:30:00.124Z", frequencyHz: 0.08 }]);
  });

  test("mean nothing chosen where nothing is said", () => {
    expect(choicesFromJson({})).toStrictEqual(NO_CHOICES);
  });
});

describe("the notes on what was gathered", () => {
  const item = (id: number, quality: GatheredReading["quality"], arrivalEpochSeconds = START): GatheredReading => ({
    ...{ id, quality, arrivalId: 1, stationId: "ash" },
    reading: { arrivalEpochSeconds, frequencyHz: 0.06, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0, kind: "ridge", row: id, bearing: null },
  });
  const all: GatheredObservations = {
    deployments: [], estimates: [],
    readings: [item(1, 1), item(2, 3), item(3, 4), item(4, 9), item(5, 2, START + 7200)],
    clockCorrections: [{ stationId: "ash", fromEpochSeconds: null, toEpochSeconds: START + 3600, fastBySeconds: 60, reason: "log" }],
  };
  const messages = (chosen: Partial<ObservationChoices>) => gatheringNotes(all, { ...NO_CHOICES, ...chosen }).map(({ message }) => message);

  test("count what flags leave aside, and what is corrected of what is used", () => {
    expect(messages({})).toStrictEqual([
      "ash: 2 readings are flagged bad or missing and not used.",
      "ash: 1 reading is flagged suspect and not used.",
      "ash: the known error of its clock was taken off the times of 1 of 2 readings.",
    ]);
    expect(messages({ usesSuspect: true }).slice(1)).toStrictEqual([
      "ash: 1 reading is flagged suspect and used all the same, as was asked.",
      "ash: the known error of its clock was taken off the times of 2 of 3 readings.",
    ]);
  });

  test("leave out what the analyst dropped or moved, and stations that were left out", () => {
    expect(messages({ droppedReadingIds: [2, 3, 4] })).toStrictEqual(["ash: the known error of its clock was taken off the times of 1 of 2 readings."]);
    expect(messages({ droppedReadingIds: [2, 3, 4], movedReadings: [{ readingId: 1, arrivalEpochSeconds: START, frequencyHz: 0.06 }] })).toStrictEqual([]);
    expect(messages({ leftOutStationIds: ["ash"] })).toStrictEqual([]);
  });
});
