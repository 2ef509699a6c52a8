import { Refusal } from "#lib/core/failures/refusal.ts";
import type { ArrivalStore, Doing, EventStore, EventToOpen } from "./ports.ts";

interface Opening {
  readonly events: EventStore;
  readonly arrivals: ArrivalStore;
}

/** Events of one day: more than anybody could tell apart. */
const MOST_OF_A_DAY = 500;

/**
 * Makes an event of stored arrivals, under the id given, or else one made from the day on which the first of them came
 * in (today where there is none): `2024-02-28`, then `2024-02-28-2` and so on. Gives the id.
 *
 * @throws as `EventStore.openEvent`
 */
export async function openEvent(stores: Opening, event: Omit<EventToOpen, "id"> & { readonly id: string | null }, doing: Doing): Promise<string> {
  return withFreeId(stores, event, doing, (id) => stores.events.openEvent({ ...event, id }, doing));
}

/** @throws as `EventStore.splitEvent` */
export async function splitEvent(
  stores: Opening,
  split: { readonly from: { readonly id: string; readonly startedFrom: number }; readonly event: Omit<EventToOpen, "id"> },
  doing: Doing,
): Promise<string> {
  return withFreeId(stores, { ...split.event, id: null }, doing, (id) => stores.events.splitEvent({ from: split.from, event: { ...split.event, id } }, doing));
}

async function withFreeId(
  { events, arrivals }: Opening,
  event: { readonly id: string | null; readonly arrivalIds: readonly number[] },
  { savedEpochSeconds }: Doing,
  make: (id: string) => Promise<void>,
): Promise<string> {
  if (event.id !== null) {
    await make(event.id);
    return event.id;
  }
  const loaded = await Promise.all(event.arrivalIds.map((id) => arrivals.loadArrival(id)));
  const times = loaded.flatMap((arrival) => arrival?.readings.map(({ reading }) => reading.arrivalEpochSeconds) ?? []);
  const first = times.reduce((earliest, time) => Math.min(earliest, time), Infinity);
  const day = new Date((Number.isFinite(first) ? first : savedEpochSeconds) * 1000).toISOString().slice(0, 10);
  for (let count = 1; count <= MOST_OF_A_DAY; count += 1) {
    const id = count === 1 ? day : `${day}-${count}`;
    if ((await events.loadEvent(id)) !== null) continue;
    await make(id);
    return id;
  }
  throw new Refusal("too-many", `There are ${MOST_OF_A_DAY} events of ${day} already; name the new one yourself.`);
}
