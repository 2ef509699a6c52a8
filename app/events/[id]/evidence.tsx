import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { AnswerWarning } from "#lib/core/source/answer.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { checkWords } from "#lib/presentation/check-words.ts";
import { areaWords, distanceWords, type DistanceUnit } from "#lib/presentation/distances.ts";
import { percentWords } from "#lib/presentation/figures.ts";
import styles from "./evidence.module.css";
import { Places } from "./places.tsx";
import { StationTable } from "./station-table.tsx";
import type { EventView } from "./view.ts";

/** Why the answer is what it is: each station's part, the checks, the other places, and the cautions. */
export function Evidence(props: {
  solution: EventSolution;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
  view: EventView;
  settings: EstimationSettings;
  /** Whether the figures still answer another choice of stations, */
  isBehind: boolean;
  /** and those of this one are being worked out. */
  isWorking: boolean;
  onInclude: (id: string, included: boolean) => void;
  onFocus: (id: string) => void;
}) {
  const { answer } = props.solution;
  const warnings = warningsToSay(props.solution);
  return (
    <section className={styles.evidence} aria-label="Evidence" aria-busy={props.isWorking}>
      <div className={props.isBehind ? styles.behind : ""}>
        <StationTable {...props} />
        {answer !== null && <Checks {...props} answer={answer} />}
        {answer !== null && <Places answer={answer} />}
        {warnings.length > 0 && (
          <>
            <h2 className={styles.heading}>Warnings</h2>
            <ul className={styles.warnings}>
              {warnings.map(({ code, message }) => (
                <li key={code + message}>{message}</li>
              ))}
            </ul>
          </>
        )}
      </div>
      <p className={styles.caution}>
        Timing only, not height. Not for navigation and not a warning service; official warnings and licensed judgement
        come first.
      </p>
    </section>
  );
}

/** What the answer's sentence, the checks or a station's own row say in other words already. */
const SAID_ELSEWHERE: ReadonlySet<string> = new Set([
  "several-sources",
  "ring-only",
  "one-place",
  "no-agreement",
  "source-on-land",
  "clock-suspect",
  "moving-storm",
]);

function warningsToSay({ stations, answer, warnings }: EventSolution): AnswerWarning[] {
  const refusals = new Set<string>(stations.flatMap(({ outcome }) => (outcome.kind === "refused" ? [outcome.code] : [])));
  return [...warnings, ...(answer?.warnings ?? [])].filter(({ code }) => !SAID_ELSEWHERE.has(code) && !refusals.has(code));
}

function Checks(props: {
  answer: NonNullable<EventSolution["answer"]>;
  solution: EventSolution;
  settings: EstimationSettings;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
}) {
  const { answer, unit } = props;
  const words = checkWords(props);
  return (
    <dl className={styles.checks}>
      {answer.source !== null && (
        <>
          <dt>Leaving one out</dt>
          <dd>{words.leavingOneOut}</dd>
          <dt>Low half, high half</dt>
          <dd>{words.drift}</dd>
          <dt>Clocks</dt>
          <dd>
            {words.clocks.map((clock) => (
              <div key={clock}>{clock}</div>
            ))}
          </dd>
        </>
      )}
      {answer.fit !== null && (
        <>
          <dt>Rings miss it by</dt>
          <dd>{distanceWords(answer.fit.ringMissMetres, unit)}, root mean square</dd>
        </>
      )}
      {answer.regions.length > 0 && (
        <>
          <dt>Regions</dt>
          <dd>
            {answer.regions.map(({ probability, areaSquareMetres }) => (
              <div key={probability}>
                {percentWords(probability)} in {areaWords(areaSquareMetres, unit)}
              </div>
            ))}
          </dd>
        </>
      )}
    </dl>
  );
}
