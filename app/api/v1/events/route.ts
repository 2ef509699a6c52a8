import { eventSummaryJson } from "#lib/contracts/api/events.ts";
import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { eventReply } from "#lib/http/event-reply.ts";

export const GET = route(OPERATIONS.listEvents, async ({ program }) => {
  const events = await program.events.listEvents();
  return { body: { events: events.map(eventSummaryJson) } };
});

export const POST = route(OPERATIONS.openEvent, async ({ body, program, doing }) => {
  const { id = null, title, note = "", arrivals = [] } = body;
  const made = await program.events.openEvent({ id, title, note, arrivalIds: arrivals }, doing);
  return { body: await eventReply(program, made), location: `/api/v1/events/${made}` };
});
