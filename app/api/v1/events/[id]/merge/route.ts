import { OPERATIONS } from "#lib/contracts/api/operations.ts";
import { route } from "#lib/http/answer-request.ts";
import { eventReply } from "#lib/http/event-reply.ts";

export const POST = route(OPERATIONS.mergeEvents, async ({ params: { id = "" }, body, program, doing }) => {
  const { revision, from, fromRevision } = body;
  await program.events.mergeEvents({ into: { id, startedFrom: revision }, from: { id: from, startedFrom: fromRevision } }, doing);
  return { body: await eventReply(program, id) };
});
