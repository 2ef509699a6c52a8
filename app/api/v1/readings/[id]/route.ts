import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { numberPart } from "#lib/http/address-part.ts";

export const PATCH = route(OPERATIONS.flagReading, async ({ params, body, program, doing }) => {
  const readingId = numberPart(params, "id", "reading");
  const revision = await program.arrivals.flagReading({ readingId, startedFrom: body.revision, quality: body.quality }, doing);
  return { body: { revision } };
});
