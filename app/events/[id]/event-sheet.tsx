"use client";

import dynamic from "next/dynamic";
import { useCallback, useEffect, useMemo, useState } from "react";
import { windowAround } from "#lib/chart/chart-window.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { Answer } from "./answer.tsx";
import { ChartBar } from "./chart-bar.tsx";
import { Evidence } from "./evidence.tsx";
import styles from "./event-sheet.module.css";
import { useEventWorker } from "./use-event-worker.ts";
import { queryFromView, type EventView } from "./view.ts";

// The map library measures the page as soon as it is loaded, which a server cannot.
const Chart = dynamic(() => import("./chart.tsx").then((module) => module.Chart), { ssr: false });

export interface EventSheetProps {
  readonly title: string;
  readonly note: string;
  readonly observations: EventObservations;
  readonly settings: EstimationSettings;
  /** Worked out by the server, without the stations that the view leaves out. */
  readonly solution: EventSolution;
  readonly view: EventView;
}

export function EventSheet(props: EventSheetProps) {
  const { observations, settings } = props;
  const [view, setView] = useState(props.view);
  const stations = useMemo(() => numberedStations(observations), [observations]);
  const window = useMemo(() => windowAround(stations.map(({ position }) => position)), [stations]);
  const worker = useEventWorker({ observations, settings, window, solution: props.solution });
  const { solve, findOverlap, drawn } = worker;
  const solution = drawn?.solution ?? props.solution;
  const cannotSolve = drawn === null && worker.failure !== null;

  const change = useCallback(
    (part: Partial<EventView>) => {
      const next = { ...view, ...part };
      const address = globalThis.location.pathname + queryFromView(next);
      // Without the worker the server works the new choice out; figures of the old one must not stand under it.
      if (part.without !== undefined && cannotSolve) {
        globalThis.location.assign(address);
        return;
      }
      setView(next);
      if (part.without !== undefined) solve(part.without);
      globalThis.history.replaceState(null, "", address);
    },
    [view, solve, cannotSolve],
  );
  const toggleFocus = useCallback((id: string) => { change({ focus: view.focus === id ? null : id }); }, [change, view.focus]);
  const toggleStation = useCallback(
    (id: string, included: boolean) => {
      change({ without: included ? view.without.filter((other) => other !== id) : [...view.without, id] });
    },
    [change, view.without],
  );

  useEffect(() => {
    if (view.showsOverlap && drawn !== null) findOverlap(view.focus);
  }, [view.showsOverlap, view.focus, drawn, findOverlap]);

  const said = { solution, stations, settings, unit: view.unit };
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
          />
          <ChartState isDrawn={drawn !== null} isWorking={worker.isWorking} failure={worker.failure} />
        </div>
        <ChartBar view={view} onChange={change} />
      </section>
      <Answer title={props.title} note={props.note} without={view.without} isWorking={worker.isWorking} {...said} />
      <Evidence {...said} view={view} onInclude={toggleStation} onFocus={toggleFocus} />
    </div>
  );
}

function ChartState({ isDrawn, isWorking, failure }: { isDrawn: boolean; isWorking: boolean; failure: string | null }) {
  if (failure !== null) {
    return (
      <p className={styles.state} role="alert">
        {isDrawn
          ? `This choice of stations could not be worked out: ${failure} The chart still shows the last answer.`
          : `The chart could not be drawn: ${failure} The figures beside it stand; loading the page again may help.`}
      </p>
    );
  }
  if (isDrawn && !isWorking) return null;
  return (
    <p className={`${styles.state ?? ""} ${isDrawn ? (styles.late ?? "") : ""}`} role="status">
      {isDrawn ? "Working out this choice of stations…" : "Drawing the chart…"}
    </p>
  );
}
