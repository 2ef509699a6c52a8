import { exportStations } from "#lib/application/export-stations.ts";
import { previewStations, takeInStations } from "#lib/application/take-in-stations.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { stationsReportJson } from "#lib/contracts/api/stations.ts";
import { route } from "#lib/http/answer-request.ts";

const FILE_NAME = "stations.csv";

export const GET = route(OPERATIONS.exportStations, async ({ program }) => ({ body: await exportStations(program.stations), fileName: FILE_NAME }));

export const POST = route(OPERATIONS.takeInStations, async ({ query, body: text, program, doing }) => {
  const file = { text, fileName: FILE_NAME };
  const report = query.preview === "yes" ? await previewStations(program.stations, file) : await takeInStations(program.stations, { ...file, token: query.token ?? null }, doing);
  return { body: stationsReportJson(report) };
});
