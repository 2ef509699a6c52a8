import { useId, useState } from "react";
import type { Draft } from "#lib/contracts/hand-readings/draft.ts";
import type { PlacedField, PlacedIssue, ReadPlaced } from "#lib/contracts/hand-readings/placed-station.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import type { DraftChange } from "./draft-changes.ts";
import { Field } from "./field.tsx";
import styles from "./form.module.css";
import { StationBox } from "./station-box.tsx";
import type { StationChoice } from "./station-choice.ts";

/** Where the waves were timed: at a stored station, or at a place that becomes one. */
export function StationPart(props: {
  draft: Draft;
  stations: readonly StationChoice[];
  chosen: StationChoice | null;
  /** Where the chosen one stood when the readings came in. */
  deployment: Deployment | null;
  placed: ReadPlaced;
  message: string | null;
  shownIssues: readonly PlacedIssue[];
  onLeave: (field: PlacedField) => void;
  change: (change: DraftChange) => void;
}) {
  const { draft, stations, chosen, deployment, change } = props;
  const { way } = draft.station;
  return (
    <fieldset className={styles.section}>
      <legend className={styles.heading}>Station</legend>
      <div role="radiogroup" aria-label="Which station" className={styles.choices}>
        <label className={styles.choice}>
          <input type="radio" name="station-way" checked={way === "stored"} onChange={() => { change({ kind: "station", part: { way: "stored" } }); }} />
          A stored one
        </label>
        <label className={styles.choice}>
          <input type="radio" name="station-way" checked={way === "new"} onChange={() => { change({ kind: "station", part: { way: "new" } }); }} />
          A new one, placed here
        </label>
      </div>
      {way === "new" && <NewStation {...props} />}
      {way === "stored" && stations.length === 0 && <p className={styles.hint}>No station is stored yet. Place a new one.</p>}
      {way === "stored" && stations.length > 0 && (
        <>
          <StationBox stations={stations} chosen={chosen} message={props.message} onChoose={(id) => { change({ kind: "station", part: { id } }); }} />
          {chosen !== null && deployment !== null && (
            <p className={styles.hint}>
              {positionWords(deployment.position)}{deployment.timeZone === null ? "" : `, ${deployment.timeZone}`}
              {chosen.deployments.length > 1 && `; ${chosen.deployments.length} deployments, of which the one at the readings’ time counts`}
            </p>
          )}
        </>
      )}
    </fieldset>
  );
}

type NewStationProps = Pick<Parameters<typeof StationPart>[0], "draft" | "placed" | "shownIssues" | "onLeave" | "change">;

function NewStation({ draft, placed, shownIssues, onLeave, change }: NewStationProps) {
  const zones = useId();
  const [names] = useState(() => Intl.supportedValuesOf("timeZone"));
  const typed = draft.station.placed;
  const field = (name: PlacedField) => ({
    value: typed[name],
    message: shownIssues.find((issue) => issue.field === name)?.message ?? null,
    onChange: (text: string) => { change({ kind: "station", part: { placed: { ...typed, [name]: text } } }); },
    onLeave: () => { if (typed[name].trim() !== "") onLeave(name); },
  });
  return (
    <>
      <div className={styles.pair}>
        <Field label="Id" {...field("id")} input={{ maxLength: 300, autoCapitalize: "none" }} />
        <Field label="Name (optional)" {...field("name")} input={{ maxLength: 300 }} />
        <Field label="Latitude, degrees" {...field("latitude")} input={{ maxLength: 40, placeholder: "21.6 N or 21.6" }} />
        <Field label="Longitude, degrees" {...field("longitude")} input={{ maxLength: 40, placeholder: "158.1 W or -158.1" }} />
      </div>
      <div className={styles.spaced}>
        <Field label="Time zone (optional)" {...field("timeZone")} input={{ maxLength: 80, list: zones, placeholder: "Pacific/Honolulu", autoCapitalize: "none" }} />
        <datalist id={zones}>{names.map((name) => <option key={name} value={name} />)}</datalist>
      </div>
      <p className={styles.hint}>
        {placed.position === null ? "A click on the map places it as well." : `It stands at ${positionWords(placed.position)}.`} It is stored together with its readings.
      </p>
    </>
  );
}
