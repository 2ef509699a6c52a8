"use client";

import dynamic from "next/dynamic";
import { useCallback, useEffect, useMemo } from "react";
import { windowAround } from "#lib/chart/chart-window.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import type { KeptAnswer } from "#lib/presentation/kept-words.ts";
import { Answer } from "./answer.tsx";
import { ChartBar } from "./chart-bar.tsx";
import { ChartState } from "./chart-state.tsx";
import { Evidence } from "./evidence.tsx";
import styles from "./event-sheet.module.css";
import { KeptAnswers } from "./kept-answers.tsx";
import { useEventWorker, type EventWorker } from "./use-event-worker.ts";
import { useView, type ChangeView } from "./use-view.ts";
import type { EventView } from "./view.ts";

// The map library measures the page as soon as it is loaded, which a server cannot.
const Chart = dynamic(() => import("./chart.tsx").then((module) => module.Chart), { ssr: false });

export interface EventSheetProps {
  readonly id: string;
  readonly title: string;
  readonly note: string;
  readonly observations: EventObservations;
  readonly settings: EstimationSettings;
  /** Worked out by the server, without these stations. */
  readonly solution: EventSolution;
  readonly without: readonly string[];
  /** Latest first. */
  readonly kept: readonly KeptAnswer[];
}

export function EventSheet(props: EventSheetProps) {
  const { observations, settings } = props;
  const stations = useMemo(() => numberedStations(observations), [observations]);
  const ids = useMemo(() => stations.map(({ id }) => id), [stations]);
  const [view, change] = useView(ids);
  const window = useMemo(() => windowAround(stations.map(({ position }) => position)), [stations]);
  const { solution: served, without: servedWithout } = props;
  const worker = useEventWorker({ observations, settings, window, solution: served, without: servedWithout }, view.without);
  const { drawn, isBehind, failure } = worker;
  const { toggleFocus, toggleStation } = useChoices(view, change);
  useOverlap(view, worker);

  // Without the worker the server works the new choice out; the address holds it by now.
  useEffect(() => {
    if (isBehind && drawn === null && failure !== null) globalThis.location.reload();
  }, [isBehind, drawn, failure]);

  const said = { solution: drawn?.solution ?? served, stations, settings, unit: view.unit, isBehind, isWorking: isBehind && failure === null };
  return (
    <div className={styles.sheet}>
      <section className={styles.chart} aria-label="Chart">
        <div className={styles.map} data-drawn={drawn?.ask}>
          <Chart
            window={window}
            stations={stations}
            baseMap={worker.baseMap}
            layers={drawn?.layers ?? null}
            overlap={view.showsOverlap ? worker.overlap : []}
            view={view}
            onFocus={toggleFocus}
            onChange={change}
          />
          <ChartState isDrawn={drawn !== null} isWorking={said.isWorking} failure={failure} />
        </div>
        <ChartBar view={view} onChange={change} />
      </section>
      <Answer title={props.title} note={props.note} without={view.without} {...said} />
      <Evidence {...said} view={view} onInclude={toggleStation} onFocus={toggleFocus} />
      <KeptAnswers eventId={props.id} kept={props.kept} stations={stations} without={view.without} isBehind={isBehind} />
    </div>
  );
}

/** What stations are chosen by, on the chart and in the table alike. Escape drops the focus from anywhere on the page. */
function useChoices(view: EventView, change: ChangeView) {
  const { focus, without } = view;
  const toggleFocus = useCallback((id: string) => { change({ focus: focus === id ? null : id }); }, [change, focus]);
  const toggleStation = useCallback(
    (id: string, included: boolean) => {
      change({ without: included ? without.filter((other) => other !== id) : [...without, id] });
    },
    [change, without],
  );
  useEffect(() => {
    const drop = ({ key }: KeyboardEvent): void => {
      if (key === "Escape") change({ focus: null });
    };
    document.addEventListener("keydown", drop);
    return () => { document.removeEventListener("keydown", drop); };
  }, [change]);
  return { toggleFocus, toggleStation };
}

function useOverlap({ showsOverlap, focus }: EventView, { drawn, findOverlap }: EventWorker): void {
  useEffect(() => {
    if (showsOverlap && drawn !== null) findOverlap(focus);
  }, [showsOverlap, focus, drawn, findOverlap]);
}
