import * as z from "zod/mini";
import { choiceField } from "./fields.ts";
import { newStationShape } from "./new-station.ts";
import { operation, type Operation } from "./operation.ts";
import { stationShape, stationsReportShape } from "./stations.ts";

/** A register of 2,000 stations has 0.5 MB as a rule. */
const MOST_CSV_BYTES = 20_000_000;

const REVISION_WANTED = "the revision, a whole number, that the change starts from";
const TOKEN_WANTED = "the token of the preview that was agreed to";
const revisionQuery = z.strictObject({
  revision: z.string(REVISION_WANTED).check(z.regex(/^[1-9]\d{0,8}$/, REVISION_WANTED)).register(z.globalRegistry, { description: REVISION_WANTED }),
});
const takingInQuery = z
  .strictObject({
    preview: z.optional(choiceField(["yes"])),
    token: z.optional(z.string(TOKEN_WANTED).check(z.regex(/^[0-9a-f]{64}$/, TOKEN_WANTED)).register(z.globalRegistry, { description: TOKEN_WANTED })),
  })
  .check(
    z.check(({ value, issues }) => {
      if (value.preview !== undefined && value.token !== undefined) issues.push({ code: "custom", path: ["token"], message: "preview or token, and not both", input: value });
    }),
  );

const exportStations: Operation<null, Record<string, never>> = {
  id: "exportStations", method: "GET", path: "/api/v1/stations.csv", role: "reader",
  summary: "The register of stations as CSV, a row for each deployment. An apostrophe stands before text that a spreadsheet would take for a formula, and is taken off again when the file is brought back.",
  query: z.strictObject({}), body: null, mostBytes: 0, answer: { status: 200, type: "text/csv" }, refusals: [],
};

const takeInStations: Operation<string, z.infer<typeof takingInQuery>> = {
  id: "takeInStations", method: "POST", path: "/api/v1/stations.csv", role: "contributor",
  summary:
    "Takes in stations from CSV: all or none. With preview=yes it only says what would change and gives a token; with that token it stores just that, and refuses where the file or its stations are not what was previewed any more; with neither it stores at once. " +
    "Columns that the file lacks leave what is stored, empty cells clear it, and a station's deployments are all those of the file.",
  query: takingInQuery, body: { type: "text/csv" }, mostBytes: MOST_CSV_BYTES,
  answer: { status: 200, type: "application/json", schema: stationsReportShape }, refusals: ["conflict"],
};

export const STATION_OPERATIONS = {
  listStations: operation({ id: "listStations", method: "GET", path: "/api/v1/stations", role: "reader", summary: "All stations, in order of their ids.", gives: z.object({ stations: z.array(stationShape) }) }),
  readStation: operation({ id: "readStation", method: "GET", path: "/api/v1/stations/{id}", role: "reader", summary: "One station.", gives: stationShape, refusals: ["not-found"] }),
  saveStation: operation({
    id: "saveStation", method: "PUT", path: "/api/v1/stations/{id}", role: "contributor",
    summary: "Describes a station anew, or for the first time (revision 0). What is not given is taken away.",
    body: newStationShape, gives: stationShape, refusals: ["conflict"],
  }),
  removeStation: operation({
    id: "removeStation", method: "DELETE", path: "/api/v1/stations/{id}", role: "contributor",
    summary: "Removes a station that has no arrivals. The content type is application/json, though there is no body.",
    query: revisionQuery, gives: z.object({ id: z.string() }), refusals: ["not-found", "conflict"],
  }),
  exportStations,
  takeInStations,
};
