"use client";

import { useRouter } from "next/navigation";
import { useEffect, useRef, useState, useSyncExternalStore, type SyntheticEvent } from "react";
import type { StationJson } from "#lib/contracts/api/stations.ts";
import { askServer, type Issue } from "../_components/ask-server.ts";
import { addressOf } from "./address.ts";
import { AliasFields } from "./alias-fields.tsx";
import { CorrectionFields } from "./correction-fields.tsx";
import { DataFields } from "./data-fields.tsx";
import { DeploymentFields } from "./deployment-fields.tsx";
import { isAbout, IssuesOf, TextField } from "./issues.tsx";
import { blankStation, draftOf, requestOf, type StationDraft } from "./station-draft.ts";
import styles from "./station-form.module.css";

const UNHEARD = "The server did not answer, so whether this was saved is not known. Try again: if it was, the server will say so.";

type State =
  | { readonly kind: "typing" | "saving" | "saved" }
  | { readonly kind: "refused"; readonly issues: readonly Issue[] }
  /** Somebody else changed it; what they made of it, where the server says. */
  | { readonly kind: "overtaken"; readonly issues: readonly Issue[]; readonly theirs: StationJson | null };

/** A station's description to be changed, or a new one's to be made. What was typed stays, whatever the server says. */
export function StationForm({ station }: { station: StationJson | null }) {
  const router = useRouter();
  const form = useRef<HTMLFormElement>(null);
  const [draft, setDraft] = useState<StationDraft>(() => (station === null ? blankStation() : draftOf(station)));
  const [revision, setRevision] = useState(station?.revision ?? 0);
  const [state, setState] = useState<State>({ kind: "typing" });
  const change = (part: Partial<StationDraft>): void => {
    setDraft((before) => ({ ...before, ...part }));
    if (state.kind === "saved") setState({ kind: "typing" });
  };
  const issues = state.kind === "refused" ? state.issues : [];
  const unplaced = issues.filter((issue) => !FIELDS.some((field) => isAbout(field, issue)));
  useEffect(() => {
    if (state.kind === "refused" || state.kind === "overtaken") form.current?.querySelector<HTMLElement>("[aria-invalid=true], [data-refused]")?.focus();
  }, [state]);

  const save = async (event: SyntheticEvent): Promise<void> => {
    event.preventDefault();
    const id = draft.id.trim();
    if (id === "") {
      setState({ kind: "refused", issues: [{ path: "id", message: "A station needs an id." }] });
      return;
    }
    setState({ kind: "saving" });
    const path = `/api/v1/stations/${encodeURIComponent(id)}`;
    const asked = await askServer<StationJson>(path, { method: "PUT", body: requestOf(draft, revision), unheard: UNHEARD });
    if (asked.kind === "failed") setState({ kind: "refused", issues: asked.issues });
    else if (asked.kind === "overtaken") {
      const now = await askServer<StationJson>(path, { unheard: UNHEARD });
      setState({ kind: "overtaken", issues: asked.issues, theirs: now.kind === "done" && now.reply.revision !== revision ? now.reply : null });
    } else {
      setRevision(asked.reply.revision);
      setDraft(draftOf(asked.reply));
      setState({ kind: "saved" });
      if (station === null) router.push(addressOf(id));
      else router.refresh();
    }
  };
  const isSaving = state.kind === "saving";
  return (
    <form ref={form} className={styles.form} noValidate onSubmit={(event) => { void save(event); }}>
      <IssuesOf issues={issues}>
        {station === null && (
          <div className={styles.section}>
            <TextField path="id" label="Id" hint="by which files and programs name the station; it cannot be changed later" value={draft.id} onChange={(id) => { change({ id }); }} className={styles.narrow} />
          </div>
        )}
        <DeploymentFields deployments={draft.deployments} onChange={(deployments) => { change({ deployments }); }} />
        <AliasFields aliases={draft.aliases} onChange={(aliases) => { change({ aliases }); }} />
        <CorrectionFields corrections={draft.clockCorrections} onChange={(clockCorrections) => { change({ clockCorrections }); }} />
        <DataFields draft={draft} onChange={change} />
      </IssuesOf>
      <div className={styles.foot}>
        {issues.length > 0 && <Refused issues={unplaced} count={issues.length} />}
        {state.kind === "overtaken" && (
          <Overtaken
            {...state}
            onKeepMine={(theirs) => { setRevision(theirs.revision); setState({ kind: "typing" }); }}
            onTakeTheirs={(theirs) => { setRevision(theirs.revision); setDraft(draftOf(theirs)); setState({ kind: "typing" }); router.refresh(); }}
          />
        )}
        <div className={styles.actions}>
          <button type="submit" className={styles.main} disabled={isSaving}>{isSaving ? "Saving…" : station === null ? "Make this station" : "Save"}</button>
          <p role="status">{state.kind === "saved" && station !== null ? `Saved as revision ${revision}.` : ""}</p>
        </div>
      </div>
      <TimeZones />
    </form>
  );
}

/** What the browser knows to offer, which is not what the server's calendar knows: so it is left out of the page as it is sent. */
function TimeZones() {
  const isInBrowser = useSyncExternalStore(() => () => undefined, () => true, () => false);
  return <datalist id="time-zones">{isInBrowser && Intl.supportedValuesOf("timeZone").map((zone) => <option key={zone} value={zone} />)}</datalist>;
}

const FIELDS = ["id", "deployments", "aliases", "clockCorrections", "group", "licence", "attribution", "contact", "doi", "visibility", "embargoUntil", "note"];

/** Messages about a field stand beside it; here is what is about none, and that there are some. */
function Refused({ issues, count }: { issues: readonly Issue[]; count: number }) {
  const beside = count - issues.length;
  return (
    <div className={styles.refused} role="alert">
      {issues.map(({ message }) => <p key={message}>{message}</p>)}
      {beside > 0 && <p>{beside === 1 ? "Nothing was saved: one field needs another look; the reason stands beside it." : `Nothing was saved: ${beside} things need another look; the reasons stand beside their fields.`}</p>}
    </div>
  );
}

function Overtaken({ issues, theirs, onKeepMine, onTakeTheirs }: { issues: readonly Issue[]; theirs: StationJson | null; onKeepMine: (theirs: StationJson) => void; onTakeTheirs: (theirs: StationJson) => void }) {
  return (
    <div className={styles.refused} role="alert" tabIndex={-1} data-refused>
      {issues.map(({ message }) => <p key={message}>{message}</p>)}
      {theirs !== null && (
        <>
          <p>What you typed is still here. Keep it and save again to put it in place of revision {theirs.revision}, whose changes stay in the history; or drop it and go on from what is stored.</p>
          <div className={styles.actions}>
            <button type="button" className={styles.button} onClick={() => { onKeepMine(theirs); }}>Keep what I typed</button>
            <button type="button" className={styles.button} onClick={() => { onTakeTheirs(theirs); }}>Drop it, show what is stored</button>
          </div>
        </>
      )}
    </div>
  );
}
