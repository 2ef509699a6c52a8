import { useId, useState } from "react";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import type { ArrivalInEvent } from "#lib/presentation/arrival-rows.ts";
import styles from "../../_components/forms.module.css";
import type { ChangeEvent, EventInView } from "./arrivals-panel.tsx";
import { chosenEvent, EventSelect } from "../../_components/event-select.tsx";
import type { EventList } from "../../_components/use-event-list.ts";

/** Moves the chosen arrivals to another event, to a new one, or out of all events. */
export function MoveForm(props: { event: EventInView; arrivals: readonly ArrivalInEvent[]; isAll: boolean; others: EventList; onChange: ChangeEvent }) {
  const { event, arrivals, isAll, others, onChange } = props;
  const [to, setTo] = useState("");
  const [title, setTitle] = useState("");
  const titleId = useId();
  const isNew = to === "new";
  const cannot = arrivals.length === 0 || to === "" || (isNew && (title.trim() === "" || isAll));

  const move = async (): Promise<void> => {
    if (isNew) {
      const body = { revision: event.revision, arrivals: arrivals.map(({ id }) => id), title: title.trim() };
      await onChange(`/api/v1/events/${encodeURIComponent(event.id)}/split`, "POST", body);
      return;
    }
    for (const { id, revision } of arrivals) {
      if (!(await onChange(`/api/v1/arrivals/${id}`, "PATCH", { revision, event: chosenEvent(to) }))) return;
    }
  };
  return (
    <div className={styles.form}>
      <EventSelect
        label={arrivals.length === 0 ? "Move the arrivals chosen above to" : `Move ${counted(arrivals.length, "arrival")} to`}
        value={to}
        others={others}
        more={[{ value: "new", words: "a new event" }, { value: "none", words: "no event: they wait" }]}
        onChange={setTo}
      />
      {isNew && (
        <>
          <label htmlFor={titleId}>Title of the new event</label>
          <input id={titleId} className={styles.text} maxLength={200} autoComplete="off" value={title} onChange={({ target }) => { setTitle(target.value); }} />
          {isAll && <p className={styles.hint}>One arrival at least stays: choose some of them.</p>}
        </>
      )}
      <button type="button" className={styles.button} disabled={cannot} onClick={() => { void move(); }}>{isNew ? "Split off" : "Move"}</button>
    </div>
  );
}
