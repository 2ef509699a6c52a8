import Link from "next/link";
import { useEffect, useRef, useState, type KeyboardEvent } from "react";
import { NO_FIGURE } from "#lib/presentation/figures.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import type { RegisterColumn, RegisterOrder, RegisterRow } from "#lib/presentation/register-rows.ts";
import { VISIBILITY_WORDS } from "#lib/presentation/station-words.ts";
import { dayWords } from "#lib/presentation/times.ts";
import { addressOf } from "./address.ts";
import styles from "./register-table.module.css";

/** As the style sheet has it. */
const ROW_PIXELS = 30;
/** Rows kept above and below those in view, so that neither the wheel nor the keyboard comes to an edge. */
const AHEAD = 12;

const HEADS: readonly { readonly column: RegisterColumn; readonly words: string }[] = [
  { column: "id", words: "id" },
  { column: "name", words: "name" },
  { column: "position", words: "position" },
  { column: "sensor", words: "sensor" },
  { column: "deployments", words: "deployments" },
  { column: "aliases", words: "aliases" },
  { column: "group", words: "group" },
  { column: "visibility", words: "seen by" },
  { column: "last-reading", words: "last reading" },
  { column: "arrivals", words: "arrivals" },
];

interface TableProps {
  readonly rows: readonly RegisterRow[];
  readonly chosenId: string | null;
  readonly order: RegisterOrder;
  readonly onChoose: (id: string | null) => void;
  readonly onOrder: (order: RegisterOrder) => void;
}

/** Only the rows in view are on the page, so that thousands are as quick as ten. Arrow keys move the choice. */
export function RegisterTable({ rows, chosenId, order, onChoose, onOrder }: TableProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const { first, last } = useRowsInView(scroller, rows.length);
  const place = rows.findIndex(({ id }) => id === chosenId);
  useEffect(() => { bringIntoView(scroller.current, place); }, [place]);

  const step = (event: KeyboardEvent): void => {
    const by = { ArrowDown: 1, ArrowUp: -1 }[event.key];
    const next = by === undefined || place < 0 ? undefined : rows[place + by];
    if (next === undefined || by === undefined) return;
    event.preventDefault();
    onChoose(next.id);
    bringIntoView(scroller.current, place + by);
    requestAnimationFrame(() => scroller.current?.querySelector<HTMLElement>("button[aria-pressed=true]")?.focus());
  };
  return (
    <div ref={scroller} className={styles.scroller} role="group" aria-label="Table of stations" tabIndex={0} onKeyDown={step}>
      <table className={styles.table} aria-rowcount={rows.length + 1}>
        <thead>
          <tr aria-rowindex={1}>
            {HEADS.map((head) => <Head key={head.column} {...head} order={order} onOrder={onOrder} />)}
          </tr>
        </thead>
        <tbody>
          <Gap rows={first} />
          {rows.slice(first, last).map((row, offset) => (
            <Row key={row.id} row={row} index={first + offset + 2} isChosen={row.id === chosenId} onChoose={onChoose} />
          ))}
          <Gap rows={rows.length - last} />
        </tbody>
      </table>
      {rows.length === 0 && <p className={styles.none}>No station has these words.</p>}
    </div>
  );
}

function Head({ column, words, order, onOrder }: { column: RegisterColumn; words: string; order: RegisterOrder; onOrder: TableProps["onOrder"] }) {
  const isHere = order.column === column;
  const direction = order.isDescending ? "descending" : "ascending";
  return (
    <th scope="col" className={styles[column]} aria-sort={isHere ? direction : "none"}>
      <button type="button" onClick={() => { onOrder({ column, isDescending: isHere && !order.isDescending }); }}>
        {words}{isHere && <span aria-hidden="true">{order.isDescending ? " ↓" : " ↑"}</span>}
      </button>
    </th>
  );
}

/** Room for the rows that are not on the page. */
function Gap({ rows }: { rows: number }) {
  return rows <= 0 ? null : <tr aria-hidden="true" style={{ height: rows * ROW_PIXELS }}><td colSpan={HEADS.length} className={styles.gap} /></tr>;
}

function Row({ row, index, isChosen, onChoose }: { row: RegisterRow; index: number; isChosen: boolean; onChoose: TableProps["onChoose"] }) {
  const { id, name, aliases, group } = row;
  const choose = (): void => { onChoose(isChosen ? null : id); };
  return (
    <tr aria-rowindex={index} className={isChosen ? styles.chosen : undefined}>
      <th scope="row" className={styles["id"]} title={id}><Link href={addressOf(id)} prefetch={false}>{id}</Link></th>
      <td className={styles["name"]} title={name}><button type="button" aria-pressed={isChosen} onClick={choose}>{name}</button></td>
      <td className={styles["position"]}>{positionWords(row.position)}</td>
      <td className={styles["sensor"]}>{row.sensor}</td>
      <td className={styles["deployments"]}>{row.deploymentCount}</td>
      <td className={styles["aliases"]} title={aliases}>{aliases}</td>
      <td className={styles["group"]} title={group}>{group}</td>
      <td className={styles["visibility"]} title={VISIBILITY_WORDS[row.visibility]}>{row.visibility}</td>
      <td className={styles["last-reading"]}>{row.lastReadingEpochSeconds === null ? NO_FIGURE : dayWords(row.lastReadingEpochSeconds)}</td>
      <td className={styles["arrivals"]}>{row.arrivalCount}</td>
    </tr>
  );
}

function useRowsInView(scroller: { readonly current: HTMLDivElement | null }, count: number): { first: number; last: number } {
  const [view, setView] = useState({ top: 0, height: 600 });
  useEffect(() => {
    const box = scroller.current;
    if (box === null) return undefined;
    // In whole rows, so that the page is made anew once a row and not once a pixel.
    const measure = (): void => {
      const [top, height] = [Math.floor(box.scrollTop / ROW_PIXELS) * ROW_PIXELS, box.clientHeight];
      setView((before) => (before.top === top && before.height === height ? before : { top, height }));
    };
    const watch = new ResizeObserver(measure);
    watch.observe(box);
    box.addEventListener("scroll", measure, { passive: true });
    return () => {
      watch.disconnect();
      box.removeEventListener("scroll", measure);
    };
  }, [scroller]);
  const first = Math.max(0, Math.min(count, Math.floor(view.top / ROW_PIXELS)) - AHEAD);
  return { first, last: Math.min(count, first + Math.ceil(view.height / ROW_PIXELS) + 2 * AHEAD) };
}

/** Scrolls as far as it takes, and not at all where the row is in view; the head covers the first row's height. */
function bringIntoView(box: HTMLDivElement | null, place: number): void {
  if (box === null || place < 0) return;
  const head = box.querySelector("thead")?.clientHeight ?? ROW_PIXELS;
  const top = place * ROW_PIXELS;
  if (top < box.scrollTop) box.scrollTop = top;
  else if (top + ROW_PIXELS + head > box.scrollTop + box.clientHeight) box.scrollTop = top + ROW_PIXELS + head - box.clientHeight;
}
