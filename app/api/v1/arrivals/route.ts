import { arrivalJson, estimateToSave } from "#lib/contracts/api/arrivals.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { readingsToSave } from "#lib/contracts/api/readings.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.listArrivals, async ({ query, program }) => {
  const { station, event, waiting, after, limit = "50" } = query;
  const afterId = after === undefined ? undefined : Number(after);
  const arrivals = await program.arrivals.listArrivals({ stationId: station, eventId: waiting === "yes" ? null : event, afterId, limit: Number(limit) });
  return { body: { arrivals: arrivals.map(arrivalJson) } };
});

export const POST = route(OPERATIONS.bringInArrival, async ({ body, program, doing }) => {
  const { station, event = null, note = "", readings = [], estimate } = body;
  const id = await program.arrivals.saveArrival(
    { stationId: station, eventId: event, note, readings: readingsToSave(readings), estimate: estimate === undefined ? null : estimateToSave(estimate) },
    doing,
  );
  const arrival = await program.arrivals.loadArrival(id);
  return { body: arrival && arrivalJson(arrival), location: `/api/v1/arrivals/${id}` };
});
