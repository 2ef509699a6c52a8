import { readingChoiceWords } from "#lib/presentation/choice-words.ts";
import { startingSentence } from "#lib/presentation/numbers-in-words.ts";
import forms from "../../_components/forms.module.css";
import styles from "./unkept.module.css";
import type { Work } from "./use-work.ts";

/** Says under the answer what it holds that nobody has kept yet, and how to go back. `change`: what was done to the event since its latest kept answer. */
export function Unkept({ work, latestNumber, change }: { work: Work; latestNumber: number; change: string | null }) {
  const { choices, isUnkept, remark } = work;
  const readings = readingChoiceWords(choices);
  const isSaid = isUnkept || remark !== null || readings !== null || change !== null;
  return (
    <div className={isSaid ? styles.unkept : styles.none} role="status">
      {change !== null && <p>The event was changed since number {latestNumber} was kept, which may not be what is shown here: {change}</p>}
      {readings !== null && <p>{startingSentence(readings)}.</p>}
      {remark !== null && <p>{remark}</p>}
      {(isUnkept || change !== null) && (
        <p className={styles.actions}>
          <span>Not kept yet.</span>
          <a href="#keep">Keep it</a>
          {work.canUndo && <button type="button" className={forms.plain} onClick={work.undo}>Undo the last change</button>}
          {isUnkept && (
            <button type="button" className={forms.plain} onClick={work.discard}>
              {latestNumber > 0 ? `Back to number ${latestNumber}` : "Back to what was brought in"}
            </button>
          )}
        </p>
      )}
    </div>
  );
}
