import * as z from "zod/mini";
import { arrivalShape, movedArrivalShape, newArrivalShape } from "./arrivals.ts";
import { describedEventShape, eventShape, eventSummaryShape, mergeShape, newEventShape, splitShape } from "./events.ts";
import { choiceField, revisionField, timeField } from "./fields.ts";
import { changesShape, localizationShape, localizationSummaryShape, newLocalizationShape } from "./localizations.ts";
import { operation } from "./operation.ts";
import { qualityField, readingShape } from "./readings.ts";
import { STATION_OPERATIONS } from "./station-operations.ts";

const LIMIT_WANTED = "a whole number from 1 to 99999";
const limitField = z.optional(z.string().check(z.regex(/^[1-9]\d{0,4}$/, LIMIT_WANTED)).register(z.globalRegistry, { description: LIMIT_WANTED }));
const AFTER_WANTED = "the id of the last one that is known already; those after it are given";
const afterField = z.optional(z.string().check(z.regex(/^\d{1,9}$/, AFTER_WANTED)).register(z.globalRegistry, { description: AFTER_WANTED }));
const stationFilter = z.optional(z.string().register(z.globalRegistry, { description: "a station's id" }));
const eventFilter = z.optional(z.string().register(z.globalRegistry, { description: "an event's id" }));
/** An arrival that waits has no event to be found by. */
const notOfEvent = z.check<{ waiting?: "yes" | undefined; event?: string | undefined }>(({ value, issues }) => {
  if (value.waiting !== undefined && value.event !== undefined) issues.push({ code: "custom", path: ["event"], message: "event or waiting, and not both", input: value });
});
const CHANGED = z.object({ revision: revisionField });
const EDIT = ["not-found", "conflict"] as const;

export const OPERATIONS = {
  ...STATION_OPERATIONS,
  describeInterface: operation({
    id: "describeInterface", method: "GET", path: "/api/v1/openapi.json", role: "reader",
    summary: "This description of the interface: OpenAPI 3.1, as JSON.",
    gives: z.looseObject({ openapi: z.string() }),
  }),
  listReadings: operation({
    id: "listReadings", method: "GET", path: "/api/v1/readings", role: "reader",
    summary: "Readings in the order in which they were brought in, by station and time (the first moment counts, the last does not); 1000 unless limit says otherwise.",
    query: z.strictObject({ station: stationFilter, from: z.optional(timeField), to: z.optional(timeField), after: afterField, limit: limitField }),
    gives: z.object({ readings: z.array(readingShape) }),
  }),
  flagReading: operation({
    id: "flagReading", method: "PATCH", path: "/api/v1/readings/{id}", role: "contributor",
    summary: "Gives a reading another quality flag. The revision is its arrival's.",
    body: z.strictObject({ revision: revisionField, quality: qualityField }),
    gives: CHANGED, refusals: EDIT,
  }),
  listArrivals: operation({
    id: "listArrivals", method: "GET", path: "/api/v1/arrivals", role: "reader",
    summary: "Arrivals in the order in which they were brought in, by station and event (waiting=yes: those of no event); 50 unless limit says otherwise.",
    query: z.strictObject({ station: stationFilter, event: eventFilter, waiting: z.optional(choiceField(["yes"])), after: afterField, limit: limitField }).check(notOfEvent),
    gives: z.object({ arrivals: z.array(arrivalShape) }),
  }),
  bringInArrival: operation({
    id: "bringInArrival", method: "POST", path: "/api/v1/arrivals", role: "contributor",
    summary: "Brings in one station's arrival: its readings, or an estimate in their place.",
    body: newArrivalShape, status: 201, gives: arrivalShape, refusals: EDIT,
  }),
  readArrival: operation({ id: "readArrival", method: "GET", path: "/api/v1/arrivals/{id}", role: "reader", summary: "One arrival with its readings.", gives: arrivalShape, refusals: ["not-found"] }),
  moveArrival: operation({
    id: "moveArrival", method: "PATCH", path: "/api/v1/arrivals/{id}", role: "analyst",
    summary: "Moves an arrival to another event, or out of its own.",
    body: movedArrivalShape, gives: CHANGED, refusals: EDIT,
  }),
  listEvents: operation({ id: "listEvents", method: "GET", path: "/api/v1/events", role: "reader", summary: "Events, latest swell first, without those merged into others.", gives: z.object({ events: z.array(eventSummaryShape) }) }),
  openEvent: operation({
    id: "openEvent", method: "POST", path: "/api/v1/events", role: "analyst",
    summary: "Makes an event of arrivals that wait for one, or an empty one. Where no id is given it is made from the day of the first arrival.",
    body: newEventShape, status: 201, gives: eventShape, refusals: ["conflict"],
  }),
  readEvent: operation({ id: "readEvent", method: "GET", path: "/api/v1/events/{id}", role: "reader", summary: "One event with its arrivals.", gives: eventShape, refusals: ["not-found"] }),
  describeEvent: operation({ id: "describeEvent", method: "PATCH", path: "/api/v1/events/{id}", role: "analyst", summary: "Gives an event another title and note.", body: describedEventShape, gives: CHANGED, refusals: EDIT }),
  mergeEvents: operation({
    id: "mergeEvents", method: "POST", path: "/api/v1/events/{id}/merge", role: "analyst",
    summary: "Takes all arrivals of another event, which stays, empty, with the answers that were kept of it.",
    body: mergeShape, gives: eventShape, refusals: EDIT,
  }),
  splitEvent: operation({
    id: "splitEvent", method: "POST", path: "/api/v1/events/{id}/split", role: "analyst",
    summary: "Makes a new event of some of this one's arrivals.",
    body: splitShape, status: 201, gives: eventShape, refusals: EDIT,
  }),
  listLocalizations: operation({
    id: "listLocalizations", method: "GET", path: "/api/v1/events/{id}/localizations", role: "reader",
    summary: "The answers that were kept of an event, latest first.",
    gives: z.object({ localizations: z.array(localizationSummaryShape) }), refusals: ["not-found"],
  }),
  keepLocalization: operation({
    id: "keepLocalization", method: "POST", path: "/api/v1/events/{id}/localizations", role: "analyst",
    summary: "Works an event's answer out anew from what is stored and what was chosen of it, and keeps it for good.",
    body: newLocalizationShape, status: 201, gives: z.object({ number: z.int(), answer: z.unknown() }), refusals: EDIT,
  }),
  readLocalization: operation({
    id: "readLocalization", method: "GET", path: "/api/v1/events/{id}/localizations/{number}", role: "reader",
    summary: "One kept answer, whole, with copies of all that made it.",
    gives: localizationShape, refusals: ["not-found"],
  }),
  compareLocalizations: operation({
    id: "compareLocalizations", method: "GET", path: "/api/v1/events/{id}/localizations/{number}/changes", role: "reader",
    summary: "What is different in a kept answer since another one of the same event, named by since.",
    query: z.strictObject({ since: z.string("the number of a kept answer").check(z.regex(/^\d{1,9}$/, "the number of a kept answer")) }),
    gives: changesShape, refusals: ["not-found"],
  }),
};
