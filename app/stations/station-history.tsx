import type { HistoryEntry } from "#lib/application/station-history.ts";
import { changedFieldWords } from "#lib/presentation/station-words.ts";
import { momentWords } from "#lib/presentation/times.ts";
import styles from "./station-form.module.css";

const KIND_WORDS = { made: "described for the first time", changed: "changed", removed: "removed" } as const;

/** Who changed the station when, and what; latest first. */
export function StationHistory({ entries }: { entries: readonly HistoryEntry[] }) {
  return (
    <section className={styles.section} aria-label="History">
      <h2 className={styles.heading}>History</h2>
      {entries.length === 0 ? <p className={styles.hint}>No change is on record.</p> : (
        <ol className={styles.history}>
          {entries.map((entry) => <Entry key={`${entry.savedEpochSeconds} ${String(entry.revision)} ${entry.kind}`} entry={entry} />)}
        </ol>
      )}
    </section>
  );
}

function Entry({ entry }: { entry: HistoryEntry }) {
  const { revision, kind, savedEpochSeconds, actor, changes } = entry;
  return (
    <li>
      <p>
        {revision !== null && `Revision ${revision}, `}{KIND_WORDS[kind]} <span className={styles.who}>{momentWords(savedEpochSeconds)}, {actor}</span>
      </p>
      {changes !== null && changes.length > 0 && (
        <ul>
          {changes.map((change) => (
            <li key={`${change.field} ${String(change.deployment)}`}>
              {changedFieldWords(change)}: <span className={styles.was}>{change.before === "" ? "nothing" : change.before}</span> → {change.after === "" ? "nothing" : change.after}
            </li>
          ))}
        </ul>
      )}
    </li>
  );
}
