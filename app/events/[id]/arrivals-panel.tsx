import Link from "next/link";
import { useRouter } from "next/navigation";
import { useId, useState, useTransition } from "react";
import { askServer, type Asked } from "../../_components/ask-server.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { arrivalRows, type ArrivalInEvent, type ReadingOfArrival } from "#lib/presentation/arrival-rows.ts";
import { auditWords, otherEvent, type AuditLine } from "#lib/presentation/audit-words.ts";
import { DescribeForm } from "./describe-form.tsx";
import { MergeForm } from "./merge-form.tsx";
import { MoveForm } from "./move-form.tsx";
import forms from "../../_components/forms.module.css";
import styles from "./arrivals-panel.module.css";
import { useEventList } from "../../_components/use-event-list.ts";

/** Asks the server for a change of the event, and shows the event as it is then. Gives whether it was made. */
export type ChangeEvent = (path: string, method: string, body: unknown) => Promise<boolean>;

export interface EventInView {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly revision: number;
}

/** What the event is made of, and the ways to make it of something else: move, split, merge, describe. */
export function ArrivalsPanel(props: { trail: readonly AuditLine[]; event: EventInView; arrivals: readonly ArrivalInEvent[]; readings: readonly ReadingOfArrival[]; stations: readonly NumberedStation[] }) {
  const { event, arrivals } = props;
  const heading = useId();
  const rows = arrivalRows(props);
  const [chosen, setChosen] = useState<readonly number[]>([]);
  const [isOpen, setIsOpen] = useState(false);
  const { report, isBusy, change, refresh } = useChange();
  const others = useEventList(event.id, isOpen);
  const last = props.trail.find(({ action }) => action !== "localization saved" && action !== "event saved");
  const other = last === undefined ? null : otherEvent(last, event.id);
  const path = `/api/v1/events/${encodeURIComponent(event.id)}`;
  return (
    <section className={styles.panel} aria-labelledby={heading}>
      <details onToggle={({ currentTarget }) => { setIsOpen(currentTarget.open); }}>
        <summary className={styles.summary}><h2 id={heading} className={styles.heading}>Arrivals of this event</h2></summary>
        <ul className={styles.list}>
          {rows.map(({ id, name, what, who }) => (
            <li key={id}>
              <label className={styles.arrival}>
                <input
                  type="checkbox"
                  checked={chosen.includes(id)}
                  onChange={({ target }) => { setChosen(target.checked ? [...chosen, id] : chosen.filter((other) => other !== id)); }}
                />
                <span>{name}: {what} <span className={styles.who}>{who}</span></span>
              </label>
            </li>
          ))}
        </ul>
        {isOpen && (
          <fieldset className={styles.forms} disabled={isBusy}>
            <legend className="for-screen-readers">Change what the event is made of</legend>
            <MoveForm event={event} arrivals={arrivals.filter(({ id }) => chosen.includes(id))} isAll={chosen.length === arrivals.length} others={others} onChange={change} />
            <MergeForm event={event} others={others} onChange={(body) => change(`${path}/merge`, "POST", body)} />
            <DescribeForm event={event} onChange={(body) => change(path, "PATCH", body)} />
          </fieldset>
        )}
      </details>
      {last !== undefined && (
        <p className={styles.last}>
          Last change: {auditWords(last, event.id)} {other !== null && <Link href={`/events/${encodeURIComponent(other)}`} prefetch={false}>To {other}</Link>}
        </p>
      )}
      <div role="alert">
        {report !== null && report.kind !== "done" && report.issues.map(({ message }) => <p key={message} className={forms.problem}>{message}</p>)}
      </div>
      {report?.kind === "overtaken" && <button type="button" className={forms.button} onClick={refresh}>Show the event as it is now</button>}
    </section>
  );
}

function useChange() {
  const router = useRouter();
  const [report, setReport] = useState<Asked<unknown> | null>(null);
  const [isAsking, setIsAsking] = useState(false);
  const [isFetching, startFetching] = useTransition();
  const refresh = (): void => {
    setReport(null);
    startFetching(() => { router.refresh(); });
  };
  const change: ChangeEvent = async (path, method, body) => {
    setIsAsking(true);
    setReport(null);
    const outcome = await askServer<unknown>(path, { method, body, unheard: "The server did not answer, so whether this was done is not known. Load the page again to see." });
    setIsAsking(false);
    setReport(outcome);
    if (outcome.kind === "done") refresh();
    return outcome.kind === "done";
  };
  return { report, isBusy: isAsking || isFetching, change, refresh };
}
