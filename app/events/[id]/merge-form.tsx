import { useState } from "react";
import styles from "../../_components/forms.module.css";
import type { EventInView } from "./arrivals-panel.tsx";
import { chosenEvent, EventSelect } from "../../_components/event-select.tsx";
import type { EventList } from "../../_components/use-event-list.ts";

/** Takes another event's arrivals into this one. */
export function MergeForm({ event, others, onChange }: { event: EventInView; others: EventList; onChange: (body: unknown) => Promise<boolean> }) {
  const [from, setFrom] = useState("");
  const other = (typeof others === "string" ? [] : others).find(({ id }) => id === chosenEvent(from));
  return (
    <div className={styles.form}>
      <EventSelect label="Merge into this event all of" value={from} others={others} onChange={setFrom} />
      {other !== undefined && <p className={styles.hint}>{other.title} stays, empty, with the answers that were kept of it.</p>}
      <button
        type="button"
        className={styles.button}
        disabled={other === undefined}
        onClick={() => { if (other !== undefined) void onChange({ revision: event.revision, from: other.id, fromRevision: other.revision }); }}
      >
        Merge
      </button>
    </div>
  );
}
