import { useRouter } from "next/navigation";
import { useId, useRef, useState, useTransition } from "react";
import { askToKeep, type KeepReport } from "./ask-to-keep.ts";
import styles from "./kept-answers.module.css";

/** As long as the server takes it. */
const MOST_LETTERS = 2000;

/**
 * Keeps the answer that the page shows. The reason is held by the field itself, so that neither a refusal nor a fresh
 * list loses it; it is emptied once its answer is kept.
 */
export function KeepForm(props: { eventId: string; latestNumber: number; without: readonly string[]; isBehind: boolean }) {
  const { eventId, latestNumber, without, isBehind } = props;
  const router = useRouter();
  const field = useRef<HTMLTextAreaElement>(null);
  const id = useId();
  const [report, setReport] = useState<KeepReport | null>(null);
  const [isKeeping, setIsKeeping] = useState(false);
  const [isFetching, startFetching] = useTransition();
  const fetchList = (): void => {
    startFetching(() => { router.refresh(); });
  };

  const keep = async (): Promise<void> => {
    setIsKeeping(true);
    setReport(null);
    const outcome = await askToKeep({ eventId, startedFrom: latestNumber, leftOut: without, reason: field.current?.value.trim() ?? "" });
    setIsKeeping(false);
    setReport(outcome);
    if (outcome.kind !== "kept") return;
    if (field.current !== null) field.current.value = "";
    fetchList();
  };
  const showKept = (): void => {
    setReport(null);
    fetchList();
  };
  return (
    <>
      <label htmlFor={id} className={styles.label}>Why (optional)</label>
      <textarea ref={field} id={id} className={styles.why} rows={2} maxLength={MOST_LETTERS} readOnly={isKeeping} />
      <div className={styles.action}>
        <button type="button" className={styles.button} disabled={isKeeping || isFetching || isBehind} onClick={() => { void keep(); }}>
          {isKeeping ? "Keeping…" : "Keep this answer"}
        </button>
        <p role="status">{report?.kind === "kept" && `Kept as number ${report.number}.`}</p>
      </div>
      {report !== null && report.kind !== "kept" && <Refused report={report} onShow={showKept} />}
    </>
  );
}

function Refused({ report, onShow }: { report: Exclude<KeepReport, { kind: "kept" }>; onShow: () => void }) {
  return (
    <div className={styles.refused}>
      <div role="alert">
        {report.messages.map((message) => <p key={message}>{message}</p>)}
      </div>
      {report.kind === "overtaken" && (
        <button type="button" className={styles.button} onClick={onShow}>
          Show what was kept
        </button>
      )}
    </div>
  );
}
