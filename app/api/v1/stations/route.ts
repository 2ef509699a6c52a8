import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { stationJson } from "#lib/contracts/api/stations.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.listStations, async ({ program }) => {
  const stations = await program.stations.listStations();
  return { body: { stations: stations.map(stationJson) } };
});
