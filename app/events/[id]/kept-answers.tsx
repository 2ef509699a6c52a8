import { useId } from "react";
import { settingDifferences } from "#lib/contracts/setting-differences.ts";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { auditWords, type AuditLine } from "#lib/presentation/audit-words.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import { listWords } from "#lib/presentation/numbers-in-words.ts";
import { keptWords, type KeptAnswer } from "#lib/presentation/kept-words.ts";
import { KeepForm } from "./keep-form.tsx";
import { KeptChanges } from "./kept-changes.tsx";
import forms from "../../_components/forms.module.css";
import styles from "./kept-answers.module.css";
import type { Work } from "./use-work.ts";

/** What was kept of this event, latest first, the way to keep what the page shows now, and what was done to the event. */
export function KeptAnswers(props: {
  eventId: string;
  eventRevision: number;
  /** Latest first. */
  kept: readonly KeptAnswer[];
  /** What was done to the event, latest first. */
  trail: readonly AuditLine[];
  stations: readonly NumberedStation[];
  settingsJson: string;
  unit: DistanceUnit;
  work: Work;
  isBehind: boolean;
}) {
  const { eventId, kept, stations, trail, work } = props;
  const heading = useId();
  const differences = settingDifferences(DEFAULT_PUBLIC_SETTINGS, JSON.parse(props.settingsJson) as object);
  return (
    <section id="keep" className={styles.kept} aria-labelledby={heading}>
      <h2 id={heading} className={styles.heading}>Kept answers</h2>
      <KeepForm {...props} latestNumber={kept[0]?.number ?? 0} />
      {differences.length > 0 && (
        <p className={styles.none}>
          The settings of number {kept[0]?.number} are used: {listWords(differences.map(({ name, before, after }) => `${name} ${String(after)} (${String(before)} by default)`))}.
        </p>
      )}
      {kept.length === 0 ? (
        <p className={styles.none}>None kept yet.</p>
      ) : (
        <ol className={styles.list}>
          {kept.map((one, place) => <Entry key={one.number} kept={one} isLatest={place === 0} stations={stations} work={work} />)}
        </ol>
      )}
      {kept.length > 1 && <KeptChanges {...props} key={kept.length} numbers={kept.map(({ number }) => number)} />}
      <details className={styles.trail}>
        <summary>What was done to this event</summary>
        <ul>
          {trail.map((line, place) => <li key={place}>{auditWords(line, eventId)}</li>)}
        </ul>
      </details>
    </section>
  );
}

function Entry({ kept, isLatest, stations, work }: { kept: KeptAnswer; isLatest: boolean; stations: readonly NumberedStation[]; work: Work }) {
  const { what, who, leftOut, readings } = keptWords(kept, stations);
  return (
    <li>
      <b className={styles.number}>{kept.number}</b>
      <div className={styles.entry}>
        <p>{what}</p>
        <p className={styles.who}>{who}</p>
        {leftOut !== null && <p>{leftOut}</p>}
        {readings !== null && <p>{readings}</p>}
        {kept.reason !== "" && <p className={styles.reason}>{kept.reason}</p>}
        {!isLatest && (
          <button type="button" className={forms.plain} onClick={() => { work.takeUp(kept.choices); }}>
            Take up number {kept.number} again
          </button>
        )}
      </div>
    </li>
  );
}
