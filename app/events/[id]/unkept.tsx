import { readingChoiceWords } from "#lib/presentation/choice-words.ts";
import { startingSentence } from "#lib/presentation/numbers-in-words.ts";
import forms from "../../_components/forms.module.css";
import styles from "./unkept.module.css";
import type { Work } from "./use-work.ts";

/** Says under the answer what it holds that nobody has kept yet, and how to go back. */
export function Unkept({ work, latestNumber }: { work: Work; latestNumber: number }) {
  const { choices, isUnkept, remark } = work;
  const readings = readingChoiceWords(choices);
  return (
    <div className={isUnkept || remark !== null || readings !== null ? styles.unkept : styles.none} role="status">
      {readings !== null && <p>{startingSentence(readings)}.</p>}
      {remark !== null && <p>{remark}</p>}
      {isUnkept && (
        <p className={styles.actions}>
          <span>Not kept yet.</span>
          <a href="#keep">Keep it</a>
          {work.canUndo && <button type="button" className={forms.plain} onClick={work.undo}>Undo the last change</button>}
          <button type="button" className={forms.plain} onClick={work.discard}>
            {latestNumber > 0 ? `Back to number ${latestNumber}` : "Back to what was brought in"}
          </button>
        </p>
      )}
    </div>
  );
}
