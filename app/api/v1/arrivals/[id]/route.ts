import { arrivalJson } from "#lib/contracts/api/arrivals.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import { numberPart } from "#lib/http/address-part.ts";
import { route } from "#lib/http/answer-request.ts";

export const GET = route(OPERATIONS.readArrival, async ({ params, program }) => {
  const id = numberPart(params, "id", "arrival");
  const arrival = await program.arrivals.loadArrival(id);
  if (arrival === null) throw new Refusal("not-found", `No arrival ${id} is stored.`);
  return { body: arrivalJson(arrival) };
});

export const PATCH = route(OPERATIONS.moveArrival, async ({ params, body, program, doing }) => {
  const id = numberPart(params, "id", "arrival");
  const revision = await program.arrivals.moveArrival({ id, startedFrom: body.revision, eventId: body.event }, doing);
  return { body: { revision } };
});
