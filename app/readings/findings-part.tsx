import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import { DEFAULT_SETTINGS, type EstimationSettings } from "#lib/core/source/settings.ts";
import { distanceUnitName, type DistanceUnit } from "#lib/presentation/distances.ts";
import { lineWords, usedWords } from "#lib/presentation/line-words.ts";
import styles from "./findings.module.css";
import type { Findings } from "./fit-readings.ts";
import { LinePlot } from "./line-plot.tsx";

const UNITS = ["km", "nmi"] as const satisfies readonly DistanceUnit[];

/** What the readings say so far: how far the storm was and when, and how well that is known. */
export function FindingsPart(props: { findings: Findings; typed: number; settings: EstimationSettings; unit: DistanceUnit; onUnit: (unit: DistanceUnit) => void }) {
  const { findings, typed, settings, unit, onUnit } = props;
  const { fitted, notes } = findings;
  const used = fitted?.outcome.kind === "fitted" ? fitted.outcome.line.readingsUsed : (fitted?.readings.length ?? 0);
  return (
    <section className={styles.findings} aria-label="What the readings say">
      <div className={styles.head}>
        <p className={styles.used}>{typed === 0 ? "No reading yet" : `${usedWords(used, typed)} used`}</p>
        <fieldset className={styles.units}>
          <legend className="for-screen-readers">Distances in</legend>
          {UNITS.map((one) => (
            <label key={one} className={styles.unit}>
              <input type="radio" name="unit" checked={unit === one} onChange={() => { onUnit(one); }} />
              <abbr title={distanceUnitName(one)}>{one}</abbr>
            </label>
          ))}
        </fieldset>
      </div>
      <Line findings={findings} typed={typed} settings={settings} unit={unit} />
      <LinePlot readings={fitted?.readings ?? []} estimate={fitted === null ? null : outcomeEstimate(fitted.outcome)} settings={settings} />
      {notes.length > 0 && <ul className={styles.notes}>{notes.map((note) => <li key={note}>{note}</li>)}</ul>}
    </section>
  );
}

function Line({ findings: { fitted }, typed, settings, unit }: { findings: Findings; typed: number; settings: EstimationSettings; unit: DistanceUnit }) {
  if (fitted?.outcome.kind !== "fitted") {
    const refusal = fitted?.outcome.kind === "refused" && typed > 1 ? fitted.outcome.message : null;
    return (
      <div role="status" className={styles.words}>
        <p>{refusal ?? "Two readings with different periods give a first distance and time; more make it sure."}</p>
      </div>
    );
  }
  const { line } = fitted.outcome;
  const words = lineWords(line, { unit, settings });
  return (
    <>
      <div role="group" aria-label="Distance and time" aria-live="polite">
        <dl className={styles.figures}>
          <div>
            <dt>Distance L</dt>
            <dd>{words.distance}</dd>
          </div>
          <div>
            <dt>Left the storm t<sub>0</sub></dt>
            <dd>{words.time}</dd>
          </div>
        </dl>
      </div>
      <div className={styles.words}>
        <p>{[words.together, words.scatter, words.band, ...words.remarks].join(" ")}</p>
      </div>
    </>
  );
}

/** Distance and time in one line, for a screen too small to show the findings beside the rows. Those say the same to readers of another kind. */
export function Summary({ findings: { fitted }, unit }: { findings: Findings; unit: DistanceUnit }) {
  if (fitted?.outcome.kind !== "fitted") return null;
  const { distance, time } = lineWords(fitted.outcome.line, { unit, settings: DEFAULT_SETTINGS });
  return (
    <a className={styles.summary} href="#findings">
      <span className="for-screen-readers">To what the readings say: </span>
      <span>{distance}</span> <span>{time}</span>
    </a>
  );
}
