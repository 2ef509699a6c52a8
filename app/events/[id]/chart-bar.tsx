import type { ReactNode } from "react";
import { distanceUnitName, type DistanceUnit } from "#lib/presentation/distances.ts";
import styles from "./chart-bar.module.css";
import type { EventView } from "./view.ts";

const UNITS = ["km", "nmi"] as const satisfies readonly DistanceUnit[];

/** Under the chart: what it shows besides the rings, the unit of distances, and what its marks mean. */
export function ChartBar({ view, onChange }: { view: EventView; onChange: (part: Partial<EventView>) => void }) {
  return (
    <div className={styles.bar}>
      <label className={styles.choice}>
        <input
          type="checkbox"
          checked={view.showsSight}
          onChange={({ target }) => { onChange({ showsSight: target.checked }); }}
        />
        Sight lines
      </label>
      <label className={styles.choice}>
        <input
          type="checkbox"
          checked={view.showsOverlap}
          onChange={({ target }) => { onChange({ showsOverlap: target.checked }); }}
        />
        Overlap of bands
      </label>
      <fieldset className={styles.units}>
        <legend className="for-screen-readers">Distances in</legend>
        {UNITS.map((unit) => (
          <label key={unit} className={styles.choice}>
            <input type="radio" name="unit" checked={view.unit === unit} onChange={() => { onChange({ unit }); }} />
            <abbr title={distanceUnitName(unit)}>{unit}</abbr>
          </label>
        ))}
      </fieldset>
      <Key />
    </div>
  );
}

function Key() {
  return (
    <details className={styles.key}>
      <summary>Key</summary>
      <ul className={styles.marks}>
        <Mark name="station"><circle className={styles.station} cx="12" cy="8" r="6.5" /><text x="12" y="11.5" textAnchor="middle">1</text></Mark>
        <Mark name="ring; band: 1 sigma, readings and model spread"><path className={styles.band} d="M0 8H24" /><path className={styles.ring} d="M0 8H24" /></Mark>
        <Mark name="station in focus"><path className={styles.focusBand} d="M0 8H24" /><path className={styles.focusRing} d="M0 8H24" /></Mark>
        <Mark name="crossing of two rings"><circle className={styles.crossing} cx="12" cy="8" r="2.5" /></Mark>
        <Mark name="region of 50, 90, 95 %"><ellipse className={styles.region} cx="12" cy="8" rx="11" ry="7" /><ellipse className={styles.region} cx="12" cy="8" rx="8" ry="5" /><ellipse className={styles.region} cx="12" cy="8" rx="4" ry="2.5" /></Mark>
        <Mark name="possible source"><circle className={styles.source} cx="12" cy="8" r="4.5" /></Mark>
        <Mark name="ruled out"><path className={styles.ruledOut} d="M8 4l8 8M16 4l-8 8" /></Mark>
        <Mark name="sight line; where land blocks it"><path className={styles.sight} d="M0 8H14" /><path className={styles.block} d="M15 3V13" /></Mark>
        <Mark name="overlap of bands, darker where more meet"><rect className={styles.overlap} x="3" y="3" width="18" height="10" /></Mark>
      </ul>
    </details>
  );
}

function Mark({ name, children }: { name: string; children: ReactNode }) {
  return (
    <li>
      <svg className={styles.mark} viewBox="0 0 24 16" width="24" height="16" aria-hidden="true">
        {children}
      </svg>
      {name}
    </li>
  );
}
