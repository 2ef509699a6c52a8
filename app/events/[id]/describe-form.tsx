import { useId, useState } from "react";
import styles from "../../_components/forms.module.css";
import type { EventInView } from "./arrivals-panel.tsx";

/** Another title and note for the event. */
export function DescribeForm({ event, onChange }: { event: EventInView; onChange: (body: unknown) => Promise<boolean> }) {
  const [title, setTitle] = useState(event.title);
  const [note, setNote] = useState(event.note);
  const ids = { title: useId(), note: useId() };
  const isSame = title.trim() === event.title && note.trim() === event.note;
  return (
    <div className={styles.form}>
      <label htmlFor={ids.title}>Title</label>
      <input id={ids.title} className={styles.text} maxLength={200} autoComplete="off" value={title} onChange={({ target }) => { setTitle(target.value); }} />
      <label htmlFor={ids.note}>Note</label>
      <textarea id={ids.note} className={styles.text} rows={2} maxLength={2000} value={note} onChange={({ target }) => { setNote(target.value); }} />
      <button
        type="button"
        className={styles.button}
        disabled={isSame || title.trim() === ""}
        onClick={() => { void onChange({ revision: event.revision, title: title.trim(), note: note.trim() }); }}
      >
        Save title and note
      </button>
    </div>
  );
}
