import * as z from "zod/mini";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { isoTime } from "../iso-time.ts";
import { countField, distinctField, epochOf, listField, textField, timeField } from "./fields.ts";
import { frequencyField, frequencySigmaField, kindField, measuredReading, oneOf, periodField, timeSigmaField } from "./readings.ts";

const stationField = textField({ wanted: "the id of a station of this event", least: 1, most: 200 });
const readingField = countField({ wanted: "the id of a reading of this event", from: 1 });

const movedShape = z
  .strictObject({ reading: readingField, time: timeField, periodSeconds: z.optional(periodField), frequencyHz: z.optional(frequencyField) })
  .check(oneOf("periodSeconds", "frequencyHz"));

const addedShape = z.strictObject({
  station: stationField,
  time: timeField,
  frequencyHz: frequencyField,
  timeSigmaSeconds: z.optional(timeSigmaField),
  frequencySigmaHz: z.optional(frequencySigmaField),
  kind: z.optional(kindField),
});

/** What an analyst chose to use of an event's observations; everything that is not named stays as it was brought in. */
export const choicesFields = {
  leftOut: z.optional(distinctField(stationField, { wanted: "a list of station ids" })),
  dropped: z.optional(distinctField(readingField, { wanted: "a list of readings' ids" })),
  moved: z.optional(distinctField(movedShape, { wanted: "a list of readings with their new time and period", by: "reading" })),
  added: z.optional(listField(addedShape, { wanted: "a list of readings", most: 10_000 })),
  useSuspect: z.optional(z.boolean("true or false")),
};

export const choicesShape = z.strictObject(choicesFields);
export type ChoicesJson = z.infer<typeof choicesShape>;

export function choicesFromJson({ leftOut = [], dropped = [], moved = [], added = [], useSuspect = false }: ChoicesJson): ObservationChoices {
  return {
    leftOutStationIds: leftOut,
    droppedReadingIds: dropped,
    movedReadings: moved.map(({ reading, time, periodSeconds, frequencyHz }) => ({
      readingId: reading,
      arrivalEpochSeconds: epochOf(time),
      frequencyHz: frequencyHz ?? 1 / (periodSeconds ?? Number.NaN),
    })),
    addedReadings: added.map(({ station, ...item }) => ({ stationId: station, ...measuredReading(item) })),
    usesSuspect: useSuspect,
  };
}

export function choicesJson(choices: ObservationChoices) {
  return {
    leftOut: [...choices.leftOutStationIds],
    dropped: [...choices.droppedReadingIds],
    moved: choices.movedReadings.map(({ readingId, arrivalEpochSeconds, frequencyHz }) => ({ reading: readingId, time: isoTime(arrivalEpochSeconds), frequencyHz })),
    added: choices.addedReadings.map(({ stationId, arrivalEpochSeconds, frequencyHz, arrivalSigmaSeconds, frequencySigmaHz, kind }) => ({
      station: stationId,
      time: isoTime(arrivalEpochSeconds),
      ...{ frequencyHz, timeSigmaSeconds: arrivalSigmaSeconds, frequencySigmaHz, kind },
    })),
    useSuspect: choices.usesSuspect,
  };
}
