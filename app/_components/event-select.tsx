import { useId } from "react";
import styles from "./forms.module.css";
import type { EventList } from "./use-event-list.ts";

const PROMPT = { loading: "loading the events…", failed: "the events could not be loaded", there: "choose" } as const;

/** A choice among other events, each with the day of its first swell. */
export function EventSelect(props: { label: string; value: string; others: EventList; more?: readonly { value: string; words: string }[]; onChange: (value: string) => void }) {
  const { label, value, others, more = [], onChange } = props;
  const id = useId();
  return (
    <>
      <label htmlFor={id}>{label}</label>
      <select id={id} className={styles.select} value={value} onChange={({ target }) => { onChange(target.value); }}>
        <option value="">{PROMPT[typeof others === "string" ? others : "there"]}</option>
        {more.map((one) => <option key={one.value} value={one.value}>{one.words}</option>)}
        {(typeof others === "string" ? [] : others).map((event) => (
          <option key={event.id} value={`event ${event.id}`}>{event.title}{event.firstArrival === null ? "" : `, ${event.firstArrival.slice(0, 10)}`}</option>
        ))}
      </select>
    </>
  );
}

/** The id of the event that a value of the choice names; null where it names none. */
export function chosenEvent(value: string): string | null {
  return value.startsWith("event ") ? value.slice("event ".length) : null;
}
