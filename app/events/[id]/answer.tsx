import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { answerWords, type AnswerWords } from "#lib/presentation/answer-words.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import { leftOutWords } from "#lib/presentation/kept-words.ts";
import styles from "./answer.module.css";

/** The answer first: place and time large, then what was found in a sentence. */
export function Answer(props: {
  title: string;
  note: string;
  solution: EventSolution;
  stations: readonly NumberedStation[];
  /** Ids of the stations that the reader has left out. */
  without: readonly string[];
  settings: EstimationSettings;
  unit: DistanceUnit;
  /** Whether the figures still answer another choice of stations, */
  isBehind: boolean;
  /** and those of this one are being worked out. */
  isWorking: boolean;
}) {
  const words = answerWords(props);
  const leftOut = leftOutWords({ leftOutStationIds: props.without }, props.stations);
  return (
    <section className={styles.answer} aria-label="Answer">
      <h1 className={styles.title}>{props.title}</h1>
      <div role="status" aria-busy={props.isWorking}>
        <div className={props.isBehind ? styles.behind : ""}>
          <Headline words={words} />
          <p className={styles.sentence}>
            <strong>{words.verdict}</strong> {words.sentence}
          </p>
        </div>
        {leftOut !== null && <p className={styles.sentence}>{leftOut}</p>}
      </div>
      {props.note !== "" && <p className={styles.note}>{props.note}</p>}
    </section>
  );
}

function Headline({ words }: { words: AnswerWords }) {
  return (
    <>
      <p className={styles.headline}>
        {words.large.map((part) => (
          <span key={part} className={styles.large}>
            {part}{" "}
          </span>
        ))}
        {words.time !== null && <span className={styles.time}>{words.time}</span>}
      </p>
      {words.sources.length > 0 && (
        <ol className={styles.sources}>
          {words.sources.map(({ mark, place, probability, time }) => (
            <li key={mark} className={styles.headline}>
              <b className={styles.mark}>{mark}</b>{" "}
              <span className={styles.large}>{place}</span>{" "}
              <span className={styles.large}>{probability}</span>{" "}
              <span className={styles.time}>{time}</span>
            </li>
          ))}
        </ol>
      )}
    </>
  );
}
