import Link from "next/link";
import type { ReactNode } from "react";
import type { StationsReportJson } from "#lib/contracts/api/stations.ts";
import { NO_FIGURE } from "#lib/presentation/figures.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import { changedFieldWords } from "#lib/presentation/station-words.ts";
import { addressOf } from "./address.ts";
import styles from "./bring-in.module.css";

/** More would be read by nobody; how many more there are is said. */
const MOST_NAMED = 200;
const MOST_CHANGED = 50;

/** What a file would change, station by station and field by field, or what it has changed. */
export function Preview({ fileName, report, onStore, onPutAway }: { fileName: string; report: StationsReportJson; onStore: () => void; onPutAway: () => void }) {
  const { added, changed, unchanged, notes, stored } = report;
  const isIdle = added.length + changed.length === 0;
  return (
    <section aria-label={stored ? "What was stored" : "Preview"} className={styles.preview}>
      <h2 className={styles.heading}>{previewWords(fileName, report)}</h2>
      <p className={styles.sums}>
        {counted(added.length, "new station")}, {changed.length} changed, {unchanged.length} unchanged.
      </p>
      {notes.map(({ code, message }) => <p key={code} className={styles.note}>{message.replace(/^stations\.csv: /, "Note: ")}</p>)}
      {!stored && (
        <div className={styles.actions}>
          {!isIdle && <button type="button" className={styles.button} onClick={onStore}>{`Store ${counted(added.length + changed.length, "station")}`}</button>}
          <button type="button" className={styles.button} onClick={onPutAway}>Put it away</button>
        </div>
      )}
      {added.length > 0 && <Named heading="New" ids={added} isLinked={stored} />}
      {changed.length > 0 && <Changed changed={changed} />}
      {unchanged.length > 0 && <Named heading="Unchanged" ids={unchanged} isLinked />}
    </section>
  );
}

export function previewWords(fileName: string, { stored, added, changed }: StationsReportJson): string {
  if (stored) return `${fileName} is stored`;
  return added.length + changed.length === 0 ? `${fileName} says nothing new` : `${fileName}: nothing is stored yet`;
}

function Named({ heading, ids, isLinked }: { heading: string; ids: readonly string[]; isLinked: boolean }) {
  return (
    <>
      <h3 className={styles.subheading}>{heading}</h3>
      <ul className={styles.ids}>
        {ids.slice(0, MOST_NAMED).map((id) => <li key={id}>{isLinked ? <Link href={addressOf(id)} prefetch={false}>{id}</Link> : id}</li>)}
        {ids.length > MOST_NAMED && <li>and {ids.length - MOST_NAMED} more</li>}
      </ul>
    </>
  );
}

function Changed({ changed }: { changed: StationsReportJson["changed"] }) {
  return (
    <>
      <h3 className={styles.subheading}>Changed</h3>
      <div className={styles.scroller} role="group" aria-label="Changes" tabIndex={0}>
        <table className={styles.changes}>
          <thead>
            <tr><th scope="col">station</th><th scope="col">what</th><th scope="col">stored</th><th scope="col">in the file</th></tr>
          </thead>
          <tbody>
            {changed.slice(0, MOST_CHANGED).flatMap(({ id, changes }) =>
              changes.map((change, place) => (
                <tr key={`${id} ${change.field} ${String(change.deployment)}`} className={place === 0 ? styles.first : undefined}>
                  {place === 0 && <th scope="rowgroup" rowSpan={changes.length}><Link href={addressOf(id)} prefetch={false}>{id}</Link></th>}
                  <td>{changedFieldWords(change)}</td>
                  <Said text={change.before} />
                  <Said text={change.after} />
                </tr>
              )),
            )}
          </tbody>
        </table>
      </div>
      {changed.length > MOST_CHANGED && <p>and {counted(changed.length - MOST_CHANGED, "more changed station")}.</p>}
    </>
  );
}

function Said({ text }: { text: string }): ReactNode {
  return <td className={styles.said}>{text === "" ? <><span aria-hidden="true">{NO_FIGURE}</span><span className="for-screen-readers">nothing</span></> : text}</td>;
}
