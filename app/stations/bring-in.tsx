import { useRouter } from "next/navigation";
import { useId, useRef, useState, type DragEvent } from "react";
import type { StationsReportJson } from "#lib/contracts/api/stations.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import { askToTakeIn, type TakenIn } from "./ask-to-take-in.ts";
import styles from "./bring-in.module.css";
import { Preview, previewWords } from "./preview.tsx";

interface ChosenFile {
  readonly name: string;
  readonly bytes: ArrayBuffer;
}

type State =
  | { readonly kind: "waiting" }
  | { readonly kind: "asking"; readonly words: string }
  | { readonly kind: "answered"; readonly file: ChosenFile; readonly answer: TakenIn };

/** A file of stations: chosen or dropped, looked at row by row, and stored once that was agreed to. */
export function BringIn() {
  const router = useRouter();
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const [state, setState] = useState<State>({ kind: "waiting" });
  const [isOver, setIsOver] = useState(false);

  const look = async (file: ChosenFile): Promise<void> => {
    setState({ kind: "asking", words: `Reading ${file.name}…` });
    setState({ kind: "answered", file, answer: await askToTakeIn(file.bytes, null) });
  };
  const open = async (file: File | undefined): Promise<void> => {
    if (file === undefined) return;
    // The same file may be chosen again once it was mended.
    if (input.current !== null) input.current.value = "";
    try {
      await look({ name: file.name, bytes: await file.arrayBuffer() });
    } catch {
      setState({ kind: "answered", file: { name: file.name, bytes: new ArrayBuffer(0) }, answer: { kind: "faulty", messages: ["This could not be opened. A folder has to be opened first, and its file chosen."] } });
    }
  };
  const store = async (file: ChosenFile, { token }: StationsReportJson): Promise<void> => {
    setState({ kind: "asking", words: `Storing ${file.name}…` });
    const answer = await askToTakeIn(file.bytes, token);
    setState({ kind: "answered", file, answer });
    if (answer.kind === "report") router.refresh();
  };
  const drop = (event: DragEvent): void => {
    event.preventDefault();
    setIsOver(false);
    void open(event.dataTransfer.files[0]);
  };
  return (
    <div className={styles.panel}>
      <div className={`${styles.drop ?? ""} ${isOver ? (styles.over ?? "") : ""}`} onDragOver={(event) => { event.preventDefault(); setIsOver(true); }} onDragLeave={() => { setIsOver(false); }} onDrop={drop}>
        <label htmlFor={id}>A CSV file of stations, chosen or dropped here</label>
        <input ref={input} id={id} type="file" accept=".csv,text/csv,text/plain" disabled={state.kind === "asking"} onChange={({ target }) => { void open(target.files?.[0]); }} />
        <p className={styles.soft}>
          Columns that it lacks leave what is stored; empty cells clear it. A station’s deployments become all those of the file; stations that it does not name stay.
        </p>
      </div>
      <p role="status" className={state.kind === "asking" ? styles.busy : "for-screen-readers"}>{statusWords(state)}</p>
      {state.kind === "answered" && <Answered {...state} onStore={store} onLook={look} onPutAway={() => { setState({ kind: "waiting" }); }} />}
    </div>
  );
}

/** What has come about, for who does not see the page change; problems are an alert of their own. */
function statusWords(state: State): string {
  if (state.kind === "asking") return state.words;
  return state.kind === "answered" && state.answer.kind === "report" ? `${previewWords(state.file.name, state.answer.report)}.` : "";
}

function Answered(props: { file: ChosenFile; answer: TakenIn; onStore: (file: ChosenFile, report: StationsReportJson) => Promise<void>; onLook: (file: ChosenFile) => Promise<void>; onPutAway: () => void }) {
  const { file, answer } = props;
  if (answer.kind === "report") {
    return <Preview fileName={file.name} report={answer.report} onStore={() => { void props.onStore(file, answer.report); }} onPutAway={props.onPutAway} />;
  }
  const isFaulty = answer.kind === "faulty";
  return (
    <section className={styles.refused} role="alert" aria-label="What is wrong">
      <h2 className={styles.heading}>{isFaulty ? `${file.name}: nothing was stored` : `${file.name} has to be looked at again`}</h2>
      {isFaulty && answer.messages.length > 1 && <p>{counted(answer.messages.length, "problem")}:</p>}
      <ul className={styles.problems}>
        {answer.messages.map((message) => <li key={message}>{message}</li>)}
      </ul>
      {!isFaulty && <button type="button" className={styles.button} onClick={() => { void props.onLook(file); }}>Look at it again</button>}
    </section>
  );
}
