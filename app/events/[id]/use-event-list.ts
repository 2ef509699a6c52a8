import { useEffect, useState } from "react";
import { askServer } from "../../_components/ask-server.ts";

export interface OtherEvent {
  readonly id: string;
  readonly title: string;
  readonly revision: number;
  readonly firstArrival: string | null;
}

/** The other events, asked for once they are wanted; null until they are there. */
export function useEventList(ownId: string, isWanted: boolean): readonly OtherEvent[] | null {
  const [events, setEvents] = useState<readonly OtherEvent[] | null>(null);
  useEffect(() => {
    if (!isWanted) return;
    void askServer<{ events: readonly OtherEvent[] }>("/api/v1/events", { unheard: "" }).then((asked) => {
      if (asked.kind === "done") setEvents(asked.reply.events.filter(({ id }) => id !== ownId));
    });
  }, [ownId, isWanted]);
  return events;
}
