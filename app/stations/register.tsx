"use client";

import dynamic from "next/dynamic";
import Link from "next/link";
import { useCallback, useDeferredValue, useId, useMemo } from "react";
import { figure } from "#lib/presentation/figures.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import { chosenRows, type RegisterRow } from "#lib/presentation/register-rows.ts";
import { addressOf } from "./address.ts";
import { BringIn } from "./bring-in.tsx";
import styles from "./register.module.css";
import { RegisterTable } from "./register-table.tsx";
import { useView } from "./use-view.ts";

// The map library measures the page as soon as it is loaded, which a server cannot.
const StationMap = dynamic(() => import("./station-map.tsx").then((module) => module.StationMap), { ssr: false });

/** The register of stations: a table and a map that show the same ones, and the way in and out of it by file. */
export function Register({ rows }: { rows: readonly RegisterRow[] }) {
  const [view, change] = useView();
  const filter = useDeferredValue(view.filter);
  const shown = useMemo(() => chosenRows(rows, { filter, order: view.order }), [rows, filter, view.order]);
  const choose = useCallback((id: string | null) => { change({ chosen: id }); }, [change]);
  const filterId = useId();
  const chosen = rows.find(({ id }) => id === view.chosen) ?? null;
  return (
    <div className={styles.register}>
      <section className={styles.chart} aria-label="Chart">
        <div className={styles.map}>
          <StationMap all={rows} shown={shown} chosenId={view.chosen} onChoose={choose} />
        </div>
        <p className={styles.chosen} role="status">
          {chosen === null ? rows.length > 0 && <span className={styles.soft}>No station is chosen.</span> : (
            <>
              <Link href={addressOf(chosen.id)} prefetch={false}>{chosen.name}</Link> <span className={styles.soft}>{chosen.id}, {positionWords(chosen.position)}</span>
            </>
          )}
        </p>
      </section>
      <section className={styles.side} aria-label="Register">
        <div className={styles.head}>
          <h1 className={styles.title}>Stations</h1>
          <p className={styles.count} role="status">{countWords(rows.length, shown.length)}</p>
          <nav aria-label="Register" className={styles.actions}>
            <Link href="/stations/new" prefetch={false}>New station</Link>
            <button type="button" className={styles.link} aria-expanded={view.isBringingIn} onClick={() => { change({ isBringingIn: !view.isBringingIn }); }}>
              {view.isBringingIn ? "Back to the table" : "Bring in a file"}
            </button>
            {rows.length > 0 && <a href="/api/v1/stations.csv" download="stations.csv">Download all as CSV</a>}
          </nav>
        </div>
        {view.isBringingIn ? <BringIn /> : rows.length === 0 ? <Empty /> : (
          <>
            <div className={styles.filter}>
              <label htmlFor={filterId}>Filter</label>
              <input id={filterId} type="search" value={view.filter} placeholder="id, name, alias or group" autoComplete="off" spellCheck={false} onChange={({ target }) => { change({ filter: target.value }); }} />
            </div>
            <RegisterTable rows={shown} chosenId={view.chosen} order={view.order} onChoose={choose} onOrder={(order) => { change({ order }); }} />
          </>
        )}
      </section>
    </div>
  );
}

function Empty() {
  return (
    <p className={styles.empty}>
      No station is stored yet. Describe one, or bring in a file: comma-separated, with a header of at least <code>id,name,latitude,longitude</code> and
      a row for each station, or for each deployment of one.
    </p>
  );
}

function countWords(all: number, shown: number): string {
  const total = all === 1 ? "1 station" : `${figure(all)} stations`;
  return shown === all ? total : `${figure(shown)} of ${total}`;
}
