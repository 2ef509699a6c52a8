import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { eventReply } from "#lib/http/event-reply.ts";

export const POST = route(OPERATIONS.splitEvent, async ({ params: { id = "" }, body, program, doing }) => {
  const { revision, arrivals, title, note = "" } = body;
  const made = await program.events.splitEvent({ from: { id, startedFrom: revision }, event: { id: null, title, note, arrivalIds: arrivals } }, doing);
  return { body: await eventReply(program, made), location: `/api/v1/events/${made}` };
});
