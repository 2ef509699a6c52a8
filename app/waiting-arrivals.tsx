"use client";

import { useRouter } from "next/navigation";
import { useId, useState } from "react";
import { askServer, type Asked } from "./_components/ask-server.ts";
import { chosenEvent, EventSelect } from "./_components/event-select.tsx";
import forms from "./_components/forms.module.css";
import { useEventList } from "./_components/use-event-list.ts";
import text from "./page-text.module.css";

export interface WaitingArrival {
  readonly id: number;
  readonly revision: number;
  /** Where, of what, and who brought it in when. */
  readonly words: string;
}

const UNHEARD = "The server did not answer, so whether this was done is not known. Load the page again to see.";

/** Arrivals that belong to no event yet: some of them become one, or go into one that is there. */
export function WaitingArrivals({ arrivals }: { arrivals: readonly WaitingArrival[] }) {
  const router = useRouter();
  const heading = useId();
  const titleId = useId();
  const [chosen, setChosen] = useState<readonly number[]>([]);
  const [to, setTo] = useState("new");
  const [title, setTitle] = useState("");
  const [report, setReport] = useState<Asked<unknown> | null>(null);
  const [isBusy, setIsBusy] = useState(false);
  const others = useEventList(null, true);
  const isNew = to === "new";
  const cannot = isBusy || chosen.length === 0 || to === "" || (isNew && title.trim() === "");

  const takeIn = async (): Promise<Asked<{ id?: string }>> => {
    if (isNew) return askServer<{ id: string }>("/api/v1/events", { method: "POST", body: { title: title.trim(), arrivals: chosen }, unheard: UNHEARD });
    let last: Asked<{ id?: string }> = { kind: "failed", issues: [] };
    for (const { id, revision } of arrivals.filter((arrival) => chosen.includes(arrival.id))) {
      last = await askServer(`/api/v1/arrivals/${id}`, { method: "PATCH", body: { revision, event: chosenEvent(to) }, unheard: UNHEARD });
      if (last.kind !== "done") break;
    }
    return last;
  };
  const press = async (): Promise<void> => {
    setIsBusy(true);
    const outcome = await takeIn();
    setIsBusy(false);
    setReport(outcome);
    const made = isNew ? (outcome.kind === "done" ? outcome.reply.id : undefined) : (chosenEvent(to) ?? undefined);
    if (outcome.kind === "done" && made !== undefined) router.push(`/events/${encodeURIComponent(made)}`);
    else router.refresh();
  };
  return (
    <section aria-labelledby={heading} className={text.section}>
      <h2 id={heading} className={text.entryTitle}>{arrivals.length === 1 ? "One arrival waits" : `${arrivals.length} arrivals wait`} for an event</h2>
      <ul className={`${text.list ?? ""} ${text.window ?? ""}`} tabIndex={0} aria-labelledby={heading}>
        {arrivals.map(({ id, words }) => (
          <li key={id}>
            <label className={text.choice}>
              <input
                type="checkbox"
                checked={chosen.includes(id)}
                onChange={({ target }) => { setChosen(target.checked ? [...chosen, id] : chosen.filter((other) => other !== id)); }}
              />
              <span>{words}</span>
            </label>
          </li>
        ))}
      </ul>
      <div className={forms.form}>
        <EventSelect label="Take the chosen ones into" value={to} others={others} more={[{ value: "new", words: "a new event" }]} onChange={setTo} />
        {isNew && (
          <>
            <label htmlFor={titleId}>Title of the new event</label>
            <input id={titleId} className={forms.text} maxLength={200} autoComplete="off" value={title} onChange={({ target }) => { setTitle(target.value); }} />
          </>
        )}
        <button type="button" className={forms.button} disabled={cannot} onClick={() => { void press(); }}>Take in</button>
      </div>
      <div role="alert">
        {report !== null && report.kind !== "done" && report.issues.map(({ message }) => <p key={message} className={forms.problem}>{message}</p>)}
      </div>
    </section>
  );
}
