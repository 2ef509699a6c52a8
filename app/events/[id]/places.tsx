import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { probabilityFigure } from "#lib/presentation/figures.ts";
import { ruledOutMark, sourceMark } from "#lib/presentation/marks.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import { momentWords } from "#lib/presentation/times.ts";
import styles from "./places.module.css";

const SHOWN_AT_FIRST = 4;

/**
 * Where else the storm may have been, and where not and why, under the letters that stand on the chart. Sources of
 * which none stands out are the headline already.
 */
export function Places({ answer }: { answer: SourceAnswer }) {
  return (
    <>
      {answer.modes.length > 1 && answer.outcome !== "several" && (
        <>
          <h2 className={styles.heading}>Possible sources</h2>
          <ol className={styles.places}>
            {answer.modes.map((mode, index) => (
              <li key={sourceMark(index)}>
                <b>{sourceMark(index)}</b>
                <span>{positionWords(mode.position)}</span>
                <span>{momentWords(Math.round(mode.originEpochSeconds / 3600) * 3600)}</span>
                <span className={styles.figure}>{probabilityFigure(mode.probability)}</span>
              </li>
            ))}
          </ol>
        </>
      )}
      {answer.ruledOut.length > 0 && <RuledOut places={answer.ruledOut} />}
    </>
  );
}

function RuledOut({ places }: { places: SourceAnswer["ruledOut"] }) {
  const items = places.map(({ position, reason }, index) => (
    <li key={ruledOutMark(index)}>
      <b>{ruledOutMark(index)}</b>
      <span>{positionWords(position)}</span>
      <span className={styles.reason}>{reason}</span>
    </li>
  ));
  return (
    <>
      <h2 className={styles.heading}>Ruled out</h2>
      <ol className={styles.places}>{items.slice(0, SHOWN_AT_FIRST)}</ol>
      {items.length > SHOWN_AT_FIRST && (
        <details>
          <summary className={styles.more}>{items.length - SHOWN_AT_FIRST} more</summary>
          <ol className={styles.places}>{items.slice(SHOWN_AT_FIRST)}</ol>
        </details>
      )}
    </>
  );
}
