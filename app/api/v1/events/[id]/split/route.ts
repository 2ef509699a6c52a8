import { splitEvent } from "#lib/application/open-event.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { eventReply } from "#lib/http/event-reply.ts";

export const POST = route(OPERATIONS.splitEvent, async ({ params: { id = "" }, body, program, doing }) => {
  const { revision, arrivals, title, note = "" } = body;
  const made = await splitEvent(program, { from: { id, startedFrom: revision }, event: { title, note, arrivalIds: arrivals } }, doing);
  return { body: await eventReply(program, made), location: `/api/v1/events/${made}` };
});
