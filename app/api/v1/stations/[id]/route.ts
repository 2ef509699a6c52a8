import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { descriptionOf, requireStationId } from "#lib/contracts/api/new-station.ts";
import { route } from "#lib/http/answer-request.ts";
import { stationReply } from "#lib/http/station-reply.ts";

export const GET = route(OPERATIONS.readStation, async ({ params, program }) => ({ body: await stationReply(program, params["id"] ?? "") }));

export const PUT = route(OPERATIONS.saveStation, async ({ params, body, program, doing }) => {
  const id = requireStationId(params["id"] ?? "");
  await program.stations.saveStations([{ description: descriptionOf(id, body), startedFrom: body.revision }], doing);
  return { body: await stationReply(program, id) };
});

export const DELETE = route(OPERATIONS.removeStation, async ({ params, query, program, doing }) => {
  const id = params["id"] ?? "";
  await program.stations.removeStation(id, Number(query.revision), doing);
  return { body: { id } };
});
