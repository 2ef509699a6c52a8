import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { distanceUnitName, type DistanceUnit } from "#lib/presentation/distances.ts";
import { stationRows, type StationRow } from "#lib/presentation/station-rows.ts";
import styles from "./station-table.module.css";
import type { EventView } from "./view.ts";

/** Each station's part in the answer; here stations are left out and taken in again, and put in focus. */
export function StationTable(props: {
  solution: EventSolution;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
  view: EventView;
  settings: EstimationSettings;
  onInclude: (id: string, included: boolean) => void;
  onFocus: (id: string) => void;
}) {
  const { view, unit } = props;
  const rows = stationRows({ ...props, excludedIds: view.without });
  const unitName = distanceUnitName(unit);
  return (
    <table className={styles.table}>
      <caption className="for-screen-readers">
        Stations: ring with the readings’ own error, and residuals (ring minus answer), in {unitName} and hours; the
        probability that the station saw this storm; and how far the answer moves without the station
      </caption>
      <thead>
        <tr>
          <th scope="col"><span className="for-screen-readers">Included</span></th>
          <th scope="col" className={styles.number}><span className="for-screen-readers">Number</span></th>
          <th scope="col" className={styles.name}>station</th>
          <th scope="col">ring <abbr title="1 sigma, the readings’ own error">±</abbr>, <abbr title={unitName}>{unit}</abbr></th>
          <th scope="col">residual, <abbr title={unitName}>{unit}</abbr></th>
          <th scope="col"><span className="for-screen-readers">residual, </span><abbr title="hours">h</abbr></th>
          <th scope="col"><abbr title="probability that the station saw this storm">belongs</abbr></th>
          <th scope="col"><abbr title="how far the answer moves when the station is left out">without it</abbr>, <abbr title={unitName}>{unit}</abbr></th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <Row key={row.station.id} row={row} isInFocus={row.station.id === view.focus} {...props} />
        ))}
      </tbody>
    </table>
  );
}

function Row(props: {
  row: StationRow;
  isInFocus: boolean;
  onInclude: (id: string, included: boolean) => void;
  onFocus: (id: string) => void;
}) {
  const { row, isInFocus } = props;
  const { id, name, number } = row.station;
  return (
    <tr className={[isInFocus ? styles.inFocus : "", row.included ? "" : styles.leftOut].join(" ")}>
      <td>
        <input
          type="checkbox"
          className={styles.include}
          aria-label={`Include ${number} ${name}`}
          checked={row.included}
          onChange={({ target }) => { props.onInclude(id, target.checked); }}
        />
      </td>
      <td className={styles.number}>{number}</td>
      <th scope="row" className={styles.name}>
        <button type="button" className={styles.focus} aria-pressed={isInFocus} onClick={() => { props.onFocus(id); }}>
          {name} <span className={styles.id}>{id}{row.sentIn && ", estimate"}</span>
        </button>
      </th>
      {row.refusal !== null && <td colSpan={5} className={styles.words}>{row.refusal}</td>}
      {!row.included && <td colSpan={5} className={styles.words}>left out</td>}
      {row.included && row.refusal === null && <Figures row={row} />}
    </tr>
  );
}

function Figures({ row }: { row: StationRow }) {
  return (
    <>
      <td>
        {row.ring} <span className={styles.sigma}>{row.ringSigma}</span>
      </td>
      <td>
        {row.residualDistance}
        {row.residualInSigmas !== null && Math.abs(row.residualInSigmas) >= LEAST_READ && <ResidualBar inSigmas={row.residualInSigmas} />}
      </td>
      <td>{row.residualHours}</td>
      <td>{row.belongs}</td>
      <td>{row.withoutIt}</td>
    </>
  );
}

/** A bar of a ring that misses the answer by less than its band is too short to be read. */
const LEAST_READ = 1;

/** The residual of distance against two half widths of the band to either side; the figure above it says the same. */
function ResidualBar({ inSigmas }: { inSigmas: number }) {
  const end = Math.max(-2, Math.min(2, inSigmas)) * 12;
  return (
    <svg className={styles.bar} viewBox="-25 -4 50 8" width="44" height="7" aria-hidden="true">
      <rect className={styles.barFill} x={Math.min(0, end)} y="-3" width={Math.abs(end)} height="6" />
      <path className={styles.barAxis} d="M0 -4V4" />
    </svg>
  );
}
