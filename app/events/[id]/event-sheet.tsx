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

  const change = useCallback(
    (part: Partial<EventView>) => {
      const next = { ...view, ...part };
      setView(next);
      if (part.without !== undefined) solve(part.without);
      globalThis.history.replaceState(null, "", globalThis.location.pathname + queryFromView(next));
    },
    [view, solve],
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

  const said = { solution, stations, unit: view.unit };
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
          <ChartState isDrawn={drawn !== null} failure={worker.failure} />
        </div>
        <ChartBar view={view} onChange={change} />
      </section>
      <Answer title={props.title} note={props.note} {...said} />
      <Evidence {...said} view={view} spread={settings.spread} onInclude={toggleStation} onFocus={toggleFocus} />
    </div>
  );
}

function ChartState({ isDrawn, failure }: { isDrawn: boolean; failure: string | null }) {
  if (failure !== null) {
    return (
      <p className={styles.state} role="alert">
        {isDrawn
          ? `This choice of stations could not be worked out: ${failure} The chart still shows the last answer.`
          : `The chart could not be drawn: ${failure} The figures beside it stand; loading the page again may help.`}
      </p>
    );
  }
  return isDrawn ? null : (
    <p className={styles.state} role="status">
      Drawing the chart…
    </p>
  );
}
