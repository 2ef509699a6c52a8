import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { eventReply } from "#lib/http/event-reply.ts";

export const GET = route(OPERATIONS.readEvent, async ({ params: { id = "" }, program }) => ({ body: await eventReply(program, id) }));

export const PATCH = route(OPERATIONS.describeEvent, async ({ params: { id = "" }, body, program, doing }) => {
  const { revision: startedFrom, title, note } = body;
  return { body: { revision: await program.events.editEvent({ id, startedFrom, title, note }, doing) } };
});
