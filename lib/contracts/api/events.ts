import * as z from "zod/mini";
import type { SourceOutcome } from "#lib/core/source/answer.ts";
import type { Position } from "#lib/core/units/position.ts";
import { isoTime } from "../iso-time.ts";
import { arrivalShape, idField, NOTE } from "./arrivals.ts";
import { countField, distinctField, lineField, revisionField, textField, timeField } from "./fields.ts";

const titleField = lineField({ wanted: "a title of 1 to 200 letters on one line", most: 200 });
const arrivalField = countField({ wanted: "the id of an arrival that is stored", from: 1 });
const MOST_ARRIVALS = 1000;
const ID_WANTED = "an id of 1 to 80 small letters, digits and hyphens";

export const newEventShape = z.strictObject({
  id: z.optional(z.string(ID_WANTED).check(z.regex(/^[a-z0-9][a-z0-9-]{0,79}$/, ID_WANTED)).register(z.globalRegistry, { description: ID_WANTED })),
  title: titleField,
  note: z.optional(textField(NOTE)),
  arrivals: z.optional(distinctField(arrivalField, { wanted: `a list of ${MOST_ARRIVALS} arrivals' ids at most`, most: MOST_ARRIVALS })),
});

export const describedEventShape = z.strictObject({ revision: revisionField, title: titleField, note: textField(NOTE) });

export const mergeShape = z.strictObject({ revision: revisionField, from: idField("the event whose arrivals are taken"), fromRevision: revisionField });

export const splitShape = z.strictObject({ revision: revisionField, arrivals: distinctField(arrivalField, { wanted: `a list of 1 to ${MOST_ARRIVALS} arrivals' ids`, least: 1, most: MOST_ARRIVALS }), title: titleField, note: z.optional(textField(NOTE)) });

export const sourceShape = z.nullable(z.object({ latitude: z.number(), longitude: z.number(), time: timeField }));
export const outcomeField = z.enum(["located", "several", "ring-only", "too-few", "no-agreement"]);

const summary = {
  id: z.string(),
  title: z.string(),
  note: z.string(),
  revision: z.int(),
};

export const eventSummaryShape = z.object({
  ...summary,
  stations: z.int(),
  readings: z.int(),
  estimates: z.int(),
  firstArrival: z.nullable(timeField),
  saved: timeField,
  latest: z.nullable(z.object({ number: z.int(), outcome: outcomeField, source: sourceShape })),
});

export const eventShape = z.object({ ...summary, mergedInto: z.nullable(z.string()), arrivals: z.array(arrivalShape) });

interface KeptSource {
  readonly position: Position;
  readonly originEpochSeconds: number;
}

interface EventInList {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly revision: number;
  readonly stationCount: number;
  readonly readingCount: number;
  readonly estimateCount: number;
  readonly firstArrivalEpochSeconds: number | null;
  readonly savedEpochSeconds: number;
  readonly latest: { readonly number: number; readonly outcome: SourceOutcome; readonly source: KeptSource | null } | null;
}

export function eventSummaryJson(event: EventInList): z.infer<typeof eventSummaryShape> {
  const { id, title, note, revision, stationCount: stations, readingCount: readings, estimateCount: estimates, firstArrivalEpochSeconds: first, savedEpochSeconds, latest } = event;
  // A register has thousands of these: an object written out is made several times as fast as one spread together.
  return {
    id, title, note, revision, stations, readings, estimates,
    firstArrival: first === null ? null : isoTime(first),
    saved: isoTime(savedEpochSeconds),
    latest: latest && { number: latest.number, outcome: latest.outcome, source: sourceJson(latest.source) },
  };
}

export function sourceJson(source: KeptSource | null): z.infer<typeof sourceShape> {
  return source && {
    latitude: source.position.latitudeDegrees,
    longitude: source.position.longitudeDegrees,
    time: isoTime(source.originEpochSeconds),
  };
}
