import * as z from "zod/mini";
import { DEFAULT_ARRIVAL_SIGMA_SECONDS, DEFAULT_BEARING_SIGMA_DEGREES, DEFAULT_FREQUENCY_SIGMA_FRACTION } from "#lib/core/arrival/default-errors.ts";
import type { GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import { NOT_EVALUATED, QUALITY_FLAGS, type QualityFlag } from "#lib/core/arrival/quality.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import { ARRIVAL_SIGMA_SECONDS, FREQUENCY_HZ, PERIOD_SECONDS } from "#lib/core/arrival/reading-limits.ts";
import { isoTime } from "../iso-time.ts";
import { choiceField, epochOf, numberField, timeField } from "./fields.ts";

const within = (what: string, { least, most }: { least: number; most: number }) => numberField({ wanted: `a number of ${what} from ${least} to ${most}`, from: least, to: most });

export const periodField = within("seconds", PERIOD_SECONDS);
export const frequencyField = within("hertz", FREQUENCY_HZ);
export const timeSigmaField = within("seconds", ARRIVAL_SIGMA_SECONDS);
export const kindField = choiceField(["ridge", "timed"]);
export const frequencySigmaField = numberField({ wanted: `a number of hertz from 0 to ${FREQUENCY_HZ.most}`, from: 0, to: FREQUENCY_HZ.most });
const periodSigmaField = numberField({ wanted: `a number of seconds from 0 to ${PERIOD_SECONDS.most}`, from: 0, to: PERIOD_SECONDS.most });
const qualityWanted = "a quality flag: 1 good, 2 not evaluated, 3 suspect, 4 bad, 9 missing";
export const qualityField = z.literal(QUALITY_FLAGS, qualityWanted).register(z.globalRegistry, { description: qualityWanted });

/** Time, and period or frequency, with what is known of their errors. */
const measured = {
  time: timeField,
  periodSeconds: z.optional(periodField),
  frequencyHz: z.optional(frequencyField),
  timeSigmaSeconds: z.optional(timeSigmaField),
  periodSigmaSeconds: z.optional(periodSigmaField),
  frequencySigmaHz: z.optional(frequencySigmaField),
  kind: z.optional(kindField),
};

interface Measured {
  readonly time: string;
  readonly periodSeconds?: number | undefined;
  readonly frequencyHz?: number | undefined;
  readonly timeSigmaSeconds?: number | undefined;
  readonly periodSigmaSeconds?: number | undefined;
  readonly frequencySigmaHz?: number | undefined;
  readonly kind?: Reading["kind"] | undefined;
}

/** One of two fields that say the same, and not both. */
export function oneOf<Shape extends object>(first: keyof Shape & string, second: keyof Shape & string) {
  return z.check<Shape>(({ value, issues }) => {
    const given = [first, second].filter((key) => value[key as keyof Shape] !== undefined);
    if (given.length === 1) return;
    const message = given.length === 0 ? `${first} or ${second}` : `${first} or ${second}, and not both`;
    issues.push({ code: "custom", path: [given.length === 0 ? first : second], message, input: value });
  });
}

const notBothSigmas = z.check<Measured>(({ value, issues }) => {
  if (value.periodSigmaSeconds === undefined || value.frequencySigmaHz === undefined) return;
  issues.push({ code: "custom", path: ["frequencySigmaHz"], message: "periodSigmaSeconds or frequencySigmaHz, and not both", input: value });
});

const notSigmaAlone = z.check<{ readonly comesFromDegrees?: number | undefined; readonly comesFromSigmaDegrees?: number | undefined }>(({ value, issues }) => {
  if (value.comesFromSigmaDegrees === undefined || value.comesFromDegrees !== undefined) return;
  issues.push({ code: "custom", path: ["comesFromDegrees"], message: "a bearing, since comesFromSigmaDegrees gives its error", input: value });
});

/** A reading as somebody brings it in. */
export const newReadingShape = z
  .strictObject({
    ...measured,
    comesFromDegrees: z.optional(numberField({ wanted: "a bearing that the waves come from, 0 to 360 degrees clockwise from north", from: 0, to: 360 })),
    comesFromSigmaDegrees: z.optional(numberField({ wanted: "a number of degrees above 0 and up to 180", above: 0, to: 180 })),
    quality: z.optional(qualityField),
  })
  .check(oneOf("periodSeconds", "frequencyHz"), notBothSigmas, notSigmaAlone);

export type NewReading = z.infer<typeof newReadingShape>;

/** A measurement with its errors, those of the kind where none were given (see core/arrival/default-errors.ts). */
export function measuredReading(item: Measured): Omit<Reading, "row" | "bearing"> {
  const kind = item.kind ?? "ridge";
  const frequencyHz = item.frequencyHz ?? 1 / (item.periodSeconds ?? Number.NaN);
  const ofPeriodHz = item.periodSigmaSeconds === undefined ? undefined : item.periodSigmaSeconds * frequencyHz * frequencyHz;
  return {
    kind,
    arrivalEpochSeconds: epochOf(item.time),
    frequencyHz,
    arrivalSigmaSeconds: item.timeSigmaSeconds ?? DEFAULT_ARRIVAL_SIGMA_SECONDS[kind],
    frequencySigmaHz: item.frequencySigmaHz ?? ofPeriodHz ?? DEFAULT_FREQUENCY_SIGMA_FRACTION[kind] * frequencyHz,
  };
}

/** Readings of one arrival, numbered from 1 as they stand. */
export function readingsToSave(items: readonly NewReading[]): { reading: Reading; quality: QualityFlag }[] {
  return items.map((item, place) => {
    const { comesFromDegrees, comesFromSigmaDegrees: sigmaDegrees = DEFAULT_BEARING_SIGMA_DEGREES } = item;
    const bearing = comesFromDegrees === undefined ? null : { comesFromDegrees, sigmaDegrees };
    return { reading: { ...measuredReading(item), row: place + 1, bearing }, quality: item.quality ?? NOT_EVALUATED };
  });
}

export const readingShape = z.object({
  id: z.int(),
  station: z.string(),
  arrival: z.int(),
  row: z.int(),
  time: timeField,
  periodSeconds: z.number(),
  frequencyHz: z.number(),
  timeSigmaSeconds: z.number(),
  frequencySigmaHz: z.number(),
  kind: kindField,
  comesFromDegrees: z.nullable(z.number()),
  comesFromSigmaDegrees: z.nullable(z.number()),
  quality: qualityField,
});

/** A stored reading. Its time is what the station's clock said, its frequency as measured. */
export function readingJson({ id, stationId, arrivalId, quality, reading }: GatheredReading): z.infer<typeof readingShape> {
  // Written out, and not spread together, for speed: see eventSummaryJson.
  return {
    id,
    station: stationId,
    arrival: arrivalId,
    row: reading.row,
    time: isoTime(reading.arrivalEpochSeconds),
    periodSeconds: 1 / reading.frequencyHz,
    frequencyHz: reading.frequencyHz,
    timeSigmaSeconds: reading.arrivalSigmaSeconds,
    frequencySigmaHz: reading.frequencySigmaHz,
    kind: reading.kind,
    comesFromDegrees: reading.bearing?.comesFromDegrees ?? null,
    comesFromSigmaDegrees: reading.bearing?.sigmaDegrees ?? null,
    quality,
  };
}
