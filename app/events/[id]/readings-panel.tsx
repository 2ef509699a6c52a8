import { useId } from "react";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { AddReading } from "./add-reading.tsx";
import { readingRows } from "./reading-rows.ts";
import { ReadingRow } from "./reading-row.tsx";
import forms from "../../_components/forms.module.css";
import styles from "./readings-panel.module.css";
import type { Work } from "./use-work.ts";

/** The readings of the station in focus: dropped and taken up again, moved in time and period, and added. */
export function ReadingsPanel(props: {
  observations: GatheredObservations;
  stations: readonly NumberedStation[];
  solution: EventSolution;
  focus: string | null;
  work: Work;
  onFocus: (id: string | null) => void;
}) {
  const { observations, stations, solution, focus, work, onFocus } = props;
  const heading = useId();
  const choose = useId();
  const station = stations.find(({ id }) => id === focus);
  return (
    <section className={styles.panel} aria-labelledby={heading}>
      <h2 id={heading} className={styles.heading}>Readings</h2>
      <p className={styles.choose}>
        <label htmlFor={choose}>Station</label>
        <select id={choose} className={forms.choice} value={focus ?? ""} onChange={({ target }) => { onFocus(target.value === "" ? null : target.value); }}>
          <option value="">choose one, here, in the table or on the chart</option>
          {stations.map(({ id, number, name }) => <option key={id} value={id}>{number} {name}</option>)}
        </select>
      </p>
      {station !== undefined && <Readings key={station.id} {...{ observations, station, solution, work }} />}
      {observations.readings.some(({ quality }) => quality === 3) && (
        <label className={styles.suspect}>
          <input
            type="checkbox"
            checked={work.choices.usesSuspect}
            onChange={({ target }) => { work.changeReadings((before) => ({ ...before, usesSuspect: target.checked })); }}
          />
          Use readings flagged suspect
        </label>
      )}
    </section>
  );
}

function Readings({ observations, station, solution, work }: { observations: GatheredObservations; station: NumberedStation; solution: EventSolution; work: Work }) {
  const rows = readingRows({ observations, choices: work.choices, stationId: station.id, solution });
  if (rows.length === 0) return <p className={styles.none}>This station sent an estimate of distance and time, and no readings.</p>;
  return (
    <>
      <table className={styles.table}>
        <caption className="for-screen-readers">
          Readings of station {station.number} {station.name}: whether each is used, its time in UTC, its period in seconds as measured, and what was done to it
        </caption>
        <thead>
          <tr>
            <th scope="col"><span className="for-screen-readers">Used</span></th>
            <th scope="col">row</th>
            <th scope="col" className={styles.left}>time, UTC</th>
            <th scope="col" className={styles.left}>period, <abbr title="seconds">s</abbr></th>
            <th scope="col" className={styles.left}><span className="for-screen-readers">Remarks</span></th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => <ReadingRow key={row.key} row={row} onChange={work.changeReadings} />)}
        </tbody>
      </table>
      <AddReading stationId={station.id} rows={rows} onChange={work.changeReadings} />
    </>
  );
}
