import { epochOf } from "#lib/contracts/api/fields.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { readingJson } from "#lib/contracts/api/readings.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.listReadings, async ({ query, program }) => {
  const { station, from, to, after, limit = "1000" } = query;
  const span = { fromEpochSeconds: from === undefined ? undefined : epochOf(from), toEpochSeconds: to === undefined ? undefined : epochOf(to) };
  const afterId = after === undefined ? undefined : Number(after);
  const readings = await program.arrivals.listReadings({ stationId: station, afterId, ...span, limit: Number(limit) });
  return { body: { readings: readings.map(readingJson) } };
});
