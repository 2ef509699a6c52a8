import * as z from "zod/mini";
import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import type { GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import { HALF_GIRTH_METRES } from "#lib/core/geodesy/earth.ts";
import { SECONDS_PER_HOUR } from "#lib/core/units/time.ts";
import { isoTime } from "../iso-time.ts";
import { epochOf, listField, numberField, revisionField, textField, timeField } from "./fields.ts";
import { newReadingShape, readingJson, readingShape } from "./readings.ts";

const METRES_PER_KM = 1000;
const MOST_KM = Math.floor(HALF_GIRTH_METRES / METRES_PER_KM);
const distance = (wanted: string) => numberField({ wanted, from: 0.001, to: MOST_KM });

/** Common practice, no source: what estimates published without errors turn out to be good to. */
const DISTANCE_SIGMA_FRACTION = 0.08;
const ORIGIN_SIGMA_HOURS = 12;
const CORRELATION = -0.9;

/** A station's estimate in place of its readings; what is not given is taken as 8 % of the distance, 12 h and -0.9. */
export const newEstimateShape = z.strictObject({
  distanceKm: distance(`a number of kilometres from 0.001 to ${MOST_KM}, half the Earth's girth`),
  originTime: timeField,
  distanceSigmaKm: z.optional(distance(`a number of kilometres from 0.001 to ${MOST_KM}`)),
  originTimeSigmaHours: z.optional(numberField({ wanted: "a number of hours from 0.001 to 720", from: 0.001, to: 720 })),
  correlation: z.optional(numberField({ wanted: "a number above -1 and below 1", above: -1, below: 1 })),
});

export function estimateToSave(given: z.infer<typeof newEstimateShape>): ArrivalEstimate {
  const distanceMetres = given.distanceKm * METRES_PER_KM;
  const distanceSigma = given.distanceSigmaKm === undefined ? DISTANCE_SIGMA_FRACTION * distanceMetres : given.distanceSigmaKm * METRES_PER_KM;
  const originSigma = (given.originTimeSigmaHours ?? ORIGIN_SIGMA_HOURS) * SECONDS_PER_HOUR;
  const distanceOriginCovariance = (given.correlation ?? CORRELATION) * distanceSigma * originSigma;
  return {
    distanceMetres,
    originEpochSeconds: epochOf(given.originTime),
    covariance: { distanceVariance: distanceSigma ** 2, originVariance: originSigma ** 2, distanceOriginCovariance },
    sharedShifts: [],
    bearing: null,
  };
}

export const NOTE = { wanted: "text of 2000 letters at most", most: 2000 };
export const idField = (what: string) => textField({ wanted: `the id of ${what}, 1 to 200 letters`, least: 1, most: 200 });

export const newArrivalShape = z
  .strictObject({
    station: idField("a station that is stored"),
    event: z.optional(z.nullable(idField("an event that is stored, or null"))),
    note: z.optional(textField(NOTE)),
    readings: z.optional(listField(newReadingShape, { wanted: "a list of 1 to 5000 readings", least: 1, most: 5000 })),
    estimate: z.optional(newEstimateShape),
  })
  .check(
    z.check(({ value, issues }) => {
      if ((value.readings === undefined) !== (value.estimate === undefined)) return;
      const message = value.readings === undefined ? "readings, or an estimate in their place" : "readings or an estimate, and not both";
      issues.push({ code: "custom", path: ["readings"], message, input: value.readings });
    }),
  );

export const movedArrivalShape = z.strictObject({
  revision: revisionField,
  event: z.nullable(idField("an event that is stored, or null for none")),
});

const estimateShape = z.object({
  distanceKm: z.number(),
  distanceSigmaKm: z.number(),
  originTime: timeField,
  originTimeSigmaHours: z.number(),
  correlation: z.number(),
});

export const arrivalShape = z.object({
  id: z.int(),
  station: z.string(),
  event: z.nullable(z.string()),
  revision: z.int(),
  note: z.string(),
  actor: z.string(),
  saved: timeField,
  readings: z.array(readingShape),
  estimate: z.nullable(estimateShape),
});

interface ArrivalOnFile {
  readonly id: number;
  readonly stationId: string;
  readonly eventId: string | null;
  readonly revision: number;
  readonly note: string;
  readonly actor: string;
  readonly savedEpochSeconds: number;
  readonly readings: readonly GatheredReading[];
  readonly estimate: ArrivalEstimate | null;
}

export function arrivalJson(arrival: ArrivalOnFile): z.infer<typeof arrivalShape> {
  const { id, stationId, eventId, revision, note, actor, savedEpochSeconds, readings, estimate } = arrival;
  return {
    ...{ id, station: stationId, event: eventId, revision, note, actor },
    saved: isoTime(savedEpochSeconds),
    readings: readings.map(readingJson),
    estimate: estimate && estimateJson(estimate),
  };
}

function estimateJson({ distanceMetres, originEpochSeconds, covariance }: ArrivalEstimate): z.infer<typeof estimateShape> {
  const distanceSigma = Math.sqrt(covariance.distanceVariance);
  const originSigma = Math.sqrt(covariance.originVariance);
  return {
    distanceKm: distanceMetres / METRES_PER_KM,
    distanceSigmaKm: distanceSigma / METRES_PER_KM,
    originTime: isoTime(originEpochSeconds),
    originTimeSigmaHours: originSigma / SECONDS_PER_HOUR,
    correlation: covariance.distanceOriginCovariance / (distanceSigma * originSigma),
  };
}
