import { useEffect, useState } from "react";
import { askServer } from "./ask-server.ts";

export interface OtherEvent {
  readonly id: string;
  readonly title: string;
  readonly revision: number;
  readonly firstArrival: string | null;
}

export type EventList = readonly OtherEvent[] | "loading" | "failed";

/** The other events, asked for once they are wanted. */
export function useEventList(ownId: string | null, isWanted: boolean): EventList {
  const [events, setEvents] = useState<EventList>("loading");
  useEffect(() => {
    if (!isWanted) return;
    void askServer<{ events: readonly OtherEvent[] }>("/api/v1/events", { unheard: "" }).then((asked) => {
      setEvents(asked.kind === "done" ? asked.reply.events.filter(({ id }) => id !== ownId) : "failed");
    });
  }, [ownId, isWanted]);
  return events;
}
