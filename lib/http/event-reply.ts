import { arrivalJson } from "#lib/contracts/api/arrivals.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { RunningProgram } from "./running-program.ts";

/** More than any event has: a station's part in it is one arrival as a rule. */
const MOST_ARRIVALS = 10_000;

/** An event with its arrivals as `readEvent` gives it. @throws Refusal `not-found` */
export async function eventReply({ events, arrivals }: RunningProgram, id: string) {
  const event = await events.loadEvent(id);
  if (event === null) throw new Refusal("not-found", `No event "${id}" is stored.`);
  const { title, note, revision, mergedInto } = event;
  const own = await arrivals.listArrivals({ eventId: id, limit: MOST_ARRIVALS });
  return { id, title, note, revision, mergedInto, arrivals: own.map(arrivalJson) };
}
