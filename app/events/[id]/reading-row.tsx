import { NOT_EVALUATED } from "#lib/core/arrival/quality.ts";
import { QUALITY_WORDS } from "#lib/presentation/quality-words.ts";
import { momentText, momentWords, parseMoment } from "#lib/presentation/times.ts";
import { FieldCell } from "./field-cell.tsx";
import { PERIOD_WORDS, parsePeriod, periodText } from "./period-text.ts";
import type { ShownReading } from "./reading-rows.ts";
import forms from "../../_components/forms.module.css";
import styles from "./readings-panel.module.css";
import type { ChangeReadings, ReadingChoices } from "./use-work.ts";

const STEP_SECONDS = 600;
const STEP_PERIOD_SECONDS = 0.1;

export function ReadingRow({ row, onChange }: { row: ShownReading; onChange: ChangeReadings }) {
  const name = `reading ${row.row}`;
  const move = (to: { arrivalEpochSeconds?: number; frequencyHz?: number }): void => { onChange((before) => placedReading(before, row, to)); };
  const isOut = row.isDropped || row.isBarred;
  return (
    <tr className={isOut ? styles.out : ""}>
      <td>
        {row.readingId !== null && (
          <input
            type="checkbox"
            className={styles.use}
            aria-label={`Use ${name}`}
            checked={!isOut}
            disabled={row.isBarred}
            onChange={({ target }) => { onChange((before) => droppedReading(before, row, !target.checked)); }}
          />
        )}
      </td>
      <td>{row.row}</td>
      <td className={styles.left}>
        <FieldCell
          label={`Time of ${name}, UTC`}
          text={momentText(row.arrivalEpochSeconds)}
          value={row.arrivalEpochSeconds}
          parse={parseMoment}
          wanted="a day and a time such as 2024-02-28 14:30"
          step={STEP_SECONDS}
          width="time"
          onValue={(arrivalEpochSeconds) => { move({ arrivalEpochSeconds }); }}
        />
      </td>
      <td className={styles.left}>
        <FieldCell
          label={`Period of ${name}, seconds`}
          text={periodText(row.frequencyHz)}
          value={1 / row.frequencyHz}
          parse={parsePeriod}
          wanted={PERIOD_WORDS}
          step={STEP_PERIOD_SECONDS}
          width="period"
          onValue={(periodSeconds) => { move({ frequencyHz: 1 / periodSeconds }); }}
        />
      </td>
      <td className={styles.left}>
        <Remarks row={row} name={name} onChange={onChange} />
      </td>
    </tr>
  );
}

function Remarks({ row, name, onChange }: { row: ShownReading; name: string; onChange: ChangeReadings }) {
  // Hardly any reading is evaluated: saying so of each would say nothing.
  const flag = row.quality === NOT_EVALUATED ? undefined : QUALITY_WORDS.find(([value]) => value === row.quality)?.[1];
  const said = [...(flag === undefined ? [] : [flag]), ...(row.isDropped ? ["dropped"] : []), ...(row.isDownweighted ? ["weight lowered"] : [])].join(", ");
  const { broughtIn, addedAt } = row;
  return (
    <>
      {said}{" "}
      {broughtIn !== null && (
        <button
          type="button"
          className={forms.plain}
          title={`It was brought in at ${momentWords(broughtIn.arrivalEpochSeconds)} with ${periodText(broughtIn.frequencyHz)} s.`}
          aria-label={`Put ${name} back where it was brought in`}
          onClick={() => { onChange((before) => ({ ...before, movedReadings: before.movedReadings.filter(({ readingId }) => readingId !== row.readingId) })); }}
        >
          put back
        </button>
      )}
      {addedAt !== null && (
        <button
          type="button"
          className={forms.plain}
          aria-label={`Take ${name} out`}
          onClick={() => { onChange((before) => ({ ...before, addedReadings: before.addedReadings.filter((__, place) => place !== addedAt) })); }}
        >
          take out
        </button>
      )}
    </>
  );
}

function droppedReading(before: ReadingChoices, { readingId }: ShownReading, isDropped: boolean): ReadingChoices {
  const others = before.droppedReadingIds.filter((id) => id !== readingId);
  return { ...before, droppedReadingIds: isDropped && readingId !== null ? [...others, readingId] : others };
}

function placedReading(before: ReadingChoices, row: ShownReading, to: { arrivalEpochSeconds?: number; frequencyHz?: number }): ReadingChoices {
  const { readingId, addedAt, arrivalEpochSeconds, frequencyHz } = row;
  const wanted = { arrivalEpochSeconds, frequencyHz, ...to };
  // To the millisecond, as it is kept: what is shown and what is kept are then one.
  const placed = { ...wanted, arrivalEpochSeconds: Math.round(wanted.arrivalEpochSeconds * 1000) / 1000 };
  if (readingId === null) {
    return { ...before, addedReadings: before.addedReadings.map((item, place) => (place === addedAt ? { ...item, ...placed } : item)) };
  }
  const others = before.movedReadings.filter((move) => move.readingId !== readingId);
  return { ...before, movedReadings: [...others, { readingId, ...placed }] };
}
