import * as z from "zod/mini";
import type { ClockCorrection } from "#lib/core/arrival/gathered-observations.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { inOrderOfTime, overlappingSpans } from "#lib/core/arrival/overlapping-spans.ts";
import { UNDESCRIBED, VISIBILITIES, type StationDescription } from "#lib/core/arrival/station-description.ts";
import {
  ALIAS_SCHEME, ALIAS_VALUE, bareDoi, DOI, ID_WANTED, isLine, isNote, isReason, isStationId, MOST_ALIASES, MOST_CLOCK_CORRECTIONS, MOST_DEPLOYMENTS,
  MOST_FAST_BY_SECONDS, MOST_SHELF_LEGS, REASON_WANTED, STATION_LETTERS, tidy,
} from "#lib/core/arrival/station-limits.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { parseIsoTime } from "#lib/core/units/parse-iso-time.ts";
import { isTimeZone } from "#lib/core/units/time-zone.ts";
import { metresOf } from "./kilometres.ts";
import { choiceField, countField, listField, numberField, timeField } from "./fields.ts";

/** Text that passes a test of its own, with the words that follow "wanted". */
function testedField(wanted: string, accepts: (text: string) => boolean) {
  return z.string(wanted).check(z.refine(accepts, wanted)).register(z.globalRegistry, { description: wanted });
}

/** A line of text, or nothing: null and blank text are alike. */
function lineOrNothing(most: number) {
  return z.optional(z.nullable(testedField(`text of at most ${most} letters on one line, or null`, (text) => text.trim() === "" || isLine(text, most))));
}

const above = (unit: string) => z.optional(z.nullable(numberField({ wanted: `a number of ${unit} above zero, or null`, above: 0 })));
const bearing = z.optional(z.nullable(numberField({ wanted: "a bearing of 0 to 360 degrees clockwise from north, or null", from: 0, to: 360 })));
const moment = z.optional(z.nullable(timeField));
const FAST_WANTED = `by how many seconds the clock was fast, up to ${MOST_FAST_BY_SECONDS} (negative where it was slow), and not 0`;

const aliasShape = z.strictObject({
  scheme: testedField(`what kind of name this is, such as wmo, in 1 to ${STATION_LETTERS.aliasScheme} small letters, digits and hyphens, a letter first`, (text) => ALIAS_SCHEME.test(text) && text.length <= STATION_LETTERS.aliasScheme),
  value: testedField(`an alias, 1 to ${STATION_LETTERS.aliasValue} letters without a space`, (text) => ALIAS_VALUE.test(text) && text.length <= STATION_LETTERS.aliasValue),
});

const legShape = z.strictObject({
  lengthKm: numberField({ wanted: "a number of kilometres above 0 and up to 20000", from: 1e-6, to: 20_000 }),
  depthMetres: numberField({ wanted: "a number of metres above 0 and up to 12000", from: 1e-6, to: 12_000 }),
});

interface SpanJson {
  readonly from?: string | null | undefined;
  readonly to?: string | null | undefined;
}

const forwards = z.check<SpanJson>(({ value, issues }) => {
  const { fromEpochSeconds, toEpochSeconds } = spanOf(value);
  if (fromEpochSeconds === null || toEpochSeconds === null || fromEpochSeconds < toEpochSeconds) return;
  issues.push({ code: "custom", path: ["to"], message: "a time after the one in from", input: value });
});

const bothBearings = z.check<{ facesFromDegrees?: number | null | undefined; facesToDegrees?: number | null | undefined }>(({ value, issues }) => {
  const [from, to] = [value.facesFromDegrees ?? null, value.facesToDegrees ?? null];
  if ((from === null) === (to === null)) return;
  const [given, missing] = from === null ? ["facesToDegrees", "facesFromDegrees"] : ["facesFromDegrees", "facesToDegrees"];
  issues.push({ code: "custom", path: [missing], message: `a bearing of 0 to 360 degrees clockwise from north, since ${given} is given`, input: value });
});

/** Of a list whose items each have a span: every item that runs into an earlier one, at its own address. */
function apart(what: string) {
  return z.check<SpanJson[]>(({ value, issues }) => {
    for (const { earlier, later } of overlappingSpans(value.map(spanOf))) {
      issues.push({ code: "custom", path: [later, "from"], message: `${what} that do not overlap in time; this one overlaps the ${ordinal(earlier)} of the list`, input: value });
    }
  });
}

function ordinal(place: number): string {
  const number = place + 1;
  const ending = number % 100 >= 11 && number % 100 <= 13 ? "th" : (["th", "st", "nd", "rd"][number % 10] ?? "th");
  return `${number}${ending}`;
}

const deploymentShape = z
  .strictObject({
    name: testedField(`a name of 1 to ${STATION_LETTERS.name} letters on one line`, (text) => isLine(text, STATION_LETTERS.name)),
    latitudeDegrees: numberField({ wanted: "a latitude of -90 to 90 degrees, north positive", from: -90, to: 90 }),
    longitudeDegrees: numberField({ wanted: "a longitude of -180 to 360 degrees, east positive", from: -180, to: 360 }),
    depthMetres: above("metres"),
    sensor: z.optional(choiceField(["surface", "pressure", "ground"])),
    facesFromDegrees: bearing,
    facesToDegrees: bearing,
    recordMinutes: above("minutes"),
    stamp: z.optional(z.nullable(choiceField(["start", "middle", "end"]))),
    timeZone: z.optional(z.nullable(testedField("an IANA time zone such as Pacific/Honolulu, or null", isTimeZone))),
    from: moment,
    to: moment,
    shelf: z.optional(listField(legShape, { wanted: `a list of at most ${MOST_SHELF_LEGS} legs, seaward from the gauge`, most: MOST_SHELF_LEGS })),
  })
  .check(forwards, bothBearings);

const correctionShape = z
  .strictObject({
    from: moment,
    to: moment,
    fastBySeconds: numberField({ wanted: FAST_WANTED, from: -MOST_FAST_BY_SECONDS, to: MOST_FAST_BY_SECONDS }).check(z.refine((seconds) => seconds !== 0, FAST_WANTED)),
    reason: testedField(REASON_WANTED, isReason),
  })
  .check(forwards);

const eachAliasOnce = z.check<{ scheme: string; value: string }[]>(({ value, issues }) => {
  const seen = new Set<string>();
  for (const [place, alias] of value.entries()) {
    const name = `${alias.scheme}:${alias.value}`;
    if (seen.has(name)) issues.push({ code: "custom", path: [place, "value"], message: "each alias once", input: value });
    seen.add(name);
  }
});

/** A station as it is to be from now on; what is not given is taken away, or as it is of a station that nobody described. */
export const newStationShape = z.strictObject({
  revision: countField({ wanted: "the revision that the change starts from, 0 for a new station", from: 0 }),
  deployments: listField(deploymentShape, { wanted: `a list of 1 to ${MOST_DEPLOYMENTS} deployments`, least: 1, most: MOST_DEPLOYMENTS }).check(apart("deployments")),
  aliases: z.optional(listField(aliasShape, { wanted: `a list of at most ${MOST_ALIASES} aliases`, most: MOST_ALIASES }).check(eachAliasOnce)),
  clockCorrections: z.optional(listField(correctionShape, { wanted: `a list of at most ${MOST_CLOCK_CORRECTIONS} clock corrections`, most: MOST_CLOCK_CORRECTIONS }).check(apart("clock corrections"))),
  group: lineOrNothing(STATION_LETTERS.group),
  licence: lineOrNothing(STATION_LETTERS.licence),
  attribution: lineOrNothing(STATION_LETTERS.attribution),
  contact: lineOrNothing(STATION_LETTERS.contact),
  doi: z.optional(z.nullable(testedField("a DOI such as 10.1234/buoys.2024, or null", (text) => text.trim() === "" || (DOI.test(bareDoi(text)) && bareDoi(text).length <= STATION_LETTERS.doi)))),
  visibility: z.optional(choiceField(VISIBILITIES)),
  embargoUntil: moment,
  note: z.optional(testedField(`text of at most ${STATION_LETTERS.note} letters`, isNote)),
});

export type NewStation = z.infer<typeof newStationShape>;

/** @throws InputError where an address names what no new station can be called. */
export function requireStationId(id: string): string {
  if (isStationId(id)) return id;
  throw new InputError([{ code: "not-taken", path: "id", message: `id: found ${JSON.stringify(id.slice(0, 60))}; wanted ${ID_WANTED}.` }]);
}

/** A description as it is kept: texts tidied, deployments and corrections in order of time. */
export function descriptionOf(id: string, given: NewStation): StationDescription {
  return {
    id,
    groupId: textOrNull(given.group) ?? UNDESCRIBED.groupId,
    aliases: (given.aliases ?? []).map(({ scheme, value }) => ({ scheme, value })),
    deployments: inOrderOfTime(given.deployments.map((one) => deploymentOf(id, one))),
    clockCorrections: inOrderOfTime(
      (given.clockCorrections ?? []).map((one): ClockCorrection => ({ stationId: id, ...spanOf(one), fastBySeconds: one.fastBySeconds, reason: tidy(one.reason) })),
    ),
    licence: textOrNull(given.licence),
    attribution: textOrNull(given.attribution),
    contact: textOrNull(given.contact),
    doi: textOrNull(given.doi && bareDoi(given.doi)),
    visibility: given.visibility ?? UNDESCRIBED.visibility,
    embargoUntilEpochSeconds: epochOrNull(given.embargoUntil),
    note: tidy(given.note ?? ""),
  };
}

function deploymentOf(stationId: string, given: z.infer<typeof deploymentShape>): Deployment {
  const { latitudeDegrees, longitudeDegrees, facesFromDegrees, facesToDegrees, shelf = [] } = given;
  return {
    stationId,
    name: tidy(given.name),
    position: { latitudeDegrees, longitudeDegrees: longitudeDegrees > 180 ? longitudeDegrees - 360 : longitudeDegrees },
    depthMetres: given.depthMetres ?? null,
    sensor: given.sensor ?? "surface",
    exposure: typeof facesFromDegrees === "number" && typeof facesToDegrees === "number" ? { facesFromDegrees, facesToDegrees } : null,
    recordMinutes: given.recordMinutes ?? null,
    stamp: given.stamp ?? null,
    timeZone: given.timeZone ?? null,
    ...spanOf(given),
    shelf: shelf.map(({ lengthKm, depthMetres }) => ({ lengthMetres: metresOf(lengthKm), depthMetres })),
  };
}

function textOrNull(text: string | null | undefined): string | null {
  const said = tidy(text ?? "");
  return said === "" ? null : said;
}

/** Checks of a whole see its parts even where those are faulty: what is no time has been told of already, and counts as none. */
function epochOrNull(time: string | null | undefined): number | null {
  const outcome = parseIsoTime(time ?? "");
  return outcome.kind === "time" ? outcome.epochSeconds : null;
}

function spanOf({ from, to }: SpanJson): { fromEpochSeconds: number | null; toEpochSeconds: number | null } {
  return { fromEpochSeconds: epochOrNull(from), toEpochSeconds: epochOrNull(to) };
}
