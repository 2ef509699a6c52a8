import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { answerWords } from "#lib/presentation/answer-words.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import styles from "./answer.module.css";

/** The answer first: place and time large, then what was found in a sentence. */
export function Answer(props: {
  title: string;
  note: string;
  solution: EventSolution;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
}) {
  const words = answerWords(props);
  return (
    <section className={styles.answer} aria-label="Answer">
      <h1 className={styles.title}>{props.title}</h1>
      <div role="status">
        <p className={styles.headline}>
          {words.large.map((part) => (
            <span key={part} className={styles.large}>
              {part}{" "}
            </span>
          ))}
          {words.time !== null && <span className={styles.time}>{words.time}</span>}
        </p>
        <p className={styles.sentence}>
          <strong>{words.verdict}</strong> {words.sentence}
        </p>
      </div>
      {props.note !== "" && <p className={styles.note}>{props.note}</p>}
    </section>
  );
}
