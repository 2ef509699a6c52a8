"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import type { Issue } from "../_components/ask-server.ts";
import styles from "./station-form.module.css";

/** Takes a station away that has no arrivals, once that was asked twice. */
export function RemoveStation({ id, revision, arrivalCount }: { id: string; revision: number; arrivalCount: number }) {
  const router = useRouter();
  const [state, setState] = useState<"idle" | "sure" | "removing">("idle");
  const [messages, setMessages] = useState<readonly string[]>([]);
  const remove = async (): Promise<void> => {
    setState("removing");
    const said = await askToRemove(id, revision);
    setMessages(said ?? []);
    if (said === null) {
      router.push("/stations");
      router.refresh();
    } else setState("idle");
  };
  return (
    <section className={styles.section} aria-label="Removing">
      <h2 className={styles.heading}>Removing</h2>
      {arrivalCount > 0 ? (
        <p className={styles.hint}>The station has {arrivalCount === 1 ? "an arrival" : `${arrivalCount} arrivals`} and stays with them. Where it hears no more, end its last deployment.</p>
      ) : (
        <div className={styles.actions}>
          {state === "idle" && <button type="button" className={styles.button} onClick={() => { setState("sure"); }}>Remove this station</button>}
          {state !== "idle" && (
            <>
              <p>It has no arrivals; its history stays on record.</p>
              <button type="button" className={styles.button} disabled={state === "removing"} onClick={() => { void remove(); }}>Remove {id} for good</button>
              <button type="button" className={styles.button} disabled={state === "removing"} onClick={() => { setState("idle"); }}>Leave it</button>
            </>
          )}
        </div>
      )}
      {messages.length > 0 && <div className={styles.refused} role="alert">{messages.map((message) => <p key={message}>{message}</p>)}</div>}
    </section>
  );
}

/** Null where it is gone, or why it is not. */
async function askToRemove(id: string, revision: number): Promise<readonly string[] | null> {
  try {
    const init = { method: "DELETE", headers: { "content-type": "application/json" } };
    const response = await fetch(`/api/v1/stations/${encodeURIComponent(id)}?revision=${revision}`, init);
    if (response.ok) return null;
    const { issues = [] } = (await response.json()) as { issues?: readonly Issue[] };
    return issues.map(({ message }) => message);
  } catch {
    return ["The server did not answer, so whether the station was removed is not known. Load the page again to see."];
  }
}
