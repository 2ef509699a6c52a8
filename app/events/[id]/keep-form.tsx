import { useRouter } from "next/navigation";
import { useEffect, useId, useRef, useState, useTransition } from "react";
import { askServer, type Asked } from "../../_components/ask-server.ts";
import { choicesJson } from "#lib/contracts/api/choices.ts";
import forms from "../../_components/forms.module.css";
import styles from "./kept-answers.module.css";
import type { Work } from "./use-work.ts";

/** As long as the server takes it. */
const MOST_LETTERS = 2000;
/** Nothing is kept twice by trying again: what was kept meanwhile makes the server refuse. */
const UNHEARD = "The server did not answer, so whether this was kept is not known. Try again: if it was, the server will say so.";

/** Keeps the answer that the page shows, and its reason, which neither a refusal nor a fresh list loses. */
export function KeepForm(props: { eventId: string; eventRevision: number; latestNumber: number; settingsJson: string; work: Work; isBehind: boolean }) {
  const { eventId, eventRevision, latestNumber, settingsJson, work, isBehind } = props;
  const router = useRouter();
  const id = useId();
  const [report, setReport] = useState<Asked<{ number: number }> | null>(null);
  const [isKeeping, setIsKeeping] = useState(false);
  const [isFetching, startFetching] = useTransition();
  const fetchList = (): void => {
    startFetching(() => { router.refresh(); });
  };

  const keep = async (): Promise<void> => {
    setIsKeeping(true);
    setReport(null);
    const settings = JSON.parse(settingsJson) as unknown;
    const body = { startedFrom: work.startedFrom, eventRevision, ...choicesJson(work.choices), reason: work.reason.trim(), settings };
    const outcome = await askServer<{ number: number }>(`/api/v1/events/${encodeURIComponent(eventId)}/localizations`, { method: "POST", body, unheard: UNHEARD });
    setIsKeeping(false);
    setReport(outcome);
    if (outcome.kind !== "done") return;
    work.setReason("");
    work.startFrom(outcome.reply.number);
    fetchList();
  };
  // Once what was kept meanwhile is in view, the work goes on from there.
  const isShowing = useRef(false);
  const { startFrom } = work;
  useEffect(() => {
    if (isShowing.current) startFrom(latestNumber);
    isShowing.current = false;
  }, [latestNumber, startFrom]);
  const showKept = (): void => {
    setReport(null);
    isShowing.current = true;
    startFrom(latestNumber);
    fetchList();
  };
  return (
    <>
      <label htmlFor={id} className={styles.label}>Why (optional)</label>
      <textarea
        id={id}
        className={styles.why}
        rows={2}
        maxLength={MOST_LETTERS}
        readOnly={isKeeping}
        value={work.reason}
        onChange={({ target }) => { work.setReason(target.value); }}
      />
      <div className={styles.action}>
        <button type="button" className={forms.button} disabled={isKeeping || isFetching || isBehind} onClick={() => { void keep(); }}>
          {isKeeping ? "Keeping…" : "Keep this answer"}
        </button>
        <p role="status">{report?.kind === "done" && `Kept as number ${report.reply.number}.`}</p>
      </div>
      {report !== null && report.kind !== "done" && <Refused report={report} onShow={showKept} />}
    </>
  );
}

function Refused({ report, onShow }: { report: Exclude<Asked<unknown>, { kind: "done" }>; onShow: () => void }) {
  return (
    <div className={styles.refused}>
      <div role="alert">
        {report.issues.map(({ message }) => <p key={message}>{message}</p>)}
      </div>
      {report.kind === "overtaken" && (
        <button type="button" className={forms.button} onClick={onShow}>
          Show what is there now
        </button>
      )}
    </div>
  );
}
