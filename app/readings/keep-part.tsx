import { useId } from "react";
import type { Draft } from "#lib/contracts/hand-readings/draft.ts";
import { dayWords } from "#lib/presentation/times.ts";
import type { DraftChange } from "./draft-changes.ts";
import { Field, Message } from "./field.tsx";
import styles from "./form.module.css";
import type { Keeping } from "./use-keeping.ts";

/** An event that readings may be brought into. */
export interface EventChoice {
  readonly id: string;
  readonly title: string;
  readonly firstArrivalEpochSeconds: number | null;
}

const MOST_NOTE_LETTERS = 2000;
const WAYS = [
  { way: "new", words: "A new event" },
  { way: "event", words: "An event there is" },
  { way: "waiting", words: "No event yet" },
] as const;

/** What becomes of the readings: the event that they join, and the button that brings them in. */
export function KeepPart(props: {
  draft: Draft;
  events: readonly EventChoice[];
  keeping: Keeping;
  titleMessage: string | null;
  eventMessage: string | null;
  change: (change: DraftChange) => void;
  onLeaveTitle: () => void;
  onBringIn: () => void;
}) {
  const { draft, events, keeping, change } = props;
  const { way, title } = draft.keep;
  const note = useId();
  return (
    <fieldset className={styles.section}>
      <legend className={styles.heading}>Bring in</legend>
      <div role="radiogroup" aria-label="Into which event" className={styles.choices}>
        {WAYS.map((one) => (
          <label key={one.way} className={styles.choice}>
            <input type="radio" name="keep-way" checked={way === one.way} onChange={() => { change({ kind: "keep", part: { way: one.way } }); }} />
            {one.words}
          </label>
        ))}
      </div>
      {way === "new" && (
        <Field label="Title of the event" value={title} message={props.titleMessage} input={{ maxLength: 300 }} onChange={(text) => { change({ kind: "keep", part: { title: text } }); }} onLeave={props.onLeaveTitle} />
      )}
      {way === "event" && <EventBox value={draft.keep.event} events={events} message={props.eventMessage} onChange={(event) => { change({ kind: "keep", part: { event } }); }} />}
      {way === "waiting" && <p className={styles.hint}>They wait at their station until somebody gives them to an event.</p>}
      <div className={styles.spaced}>
        <label htmlFor={note} className={styles.label}>Note (optional)</label>
        <textarea id={note} className={styles.text} rows={2} maxLength={MOST_NOTE_LETTERS} value={draft.note} onChange={({ target }) => { change({ kind: "rest", part: { note: target.value } }); }} />
      </div>
      <div className={styles.actions}>
        <button type="button" className={`${styles.button ?? ""} ${styles.main ?? ""}`} disabled={keeping.isBusy} onClick={props.onBringIn}>
          {keeping.isBusy ? "Bringing in…" : "Bring in"}
        </button>
      </div>
      <div role="alert" className={keeping.refusals.length > 0 ? `${styles.report ?? ""} ${styles.refused ?? ""}` : ""}>
        {keeping.refusals.map((message) => <p key={message}>{message}</p>)}
      </div>
    </fieldset>
  );
}

function EventBox({ value, events, message, onChange }: { value: string; events: readonly EventChoice[]; message: string | null; onChange: (id: string) => void }) {
  const id = useId();
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>Event</label>
      <select
        id={id}
        className={styles.input}
        value={events.some((event) => event.id === value) ? value : ""}
        aria-invalid={message !== null}
        aria-describedby={message === null ? undefined : `${id}-message`}
        onChange={({ target }) => { onChange(target.value); }}
      >
        <option value="">{events.length === 0 ? "no event is stored yet" : "choose"}</option>
        {events.map((event) => (
          <option key={event.id} value={event.id}>
            {event.title}{event.firstArrivalEpochSeconds === null ? "" : `, first swell ${dayWords(event.firstArrivalEpochSeconds)}`}
          </option>
        ))}
      </select>
      <Message id={`${id}-message`} message={message} />
    </div>
  );
}

/** What was brought in last: said where the next station's readings begin. */
export function DoneReport({ done }: Pick<Keeping, "done">) {
  return (
    <div role="status" className={done === null ? "" : styles.report}>
      {done !== null && (
        <p>
          {done.words}{" "}
          {/* The browser's own way, so that coming back finds the lists of stations and events as they are by then. */}
          {done.event !== null && <a href={`/events/${encodeURIComponent(done.event.id)}`}>Open the event sheet: {done.event.title}</a>}
        </p>
      )}
    </div>
  );
}
