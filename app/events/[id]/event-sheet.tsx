"use client";

import dynamic from "next/dynamic";
import { useCallback, useEffect, useMemo } from "react";
import { windowAround } from "#lib/chart/chart-window.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import type { ArrivalInEvent } from "#lib/presentation/arrival-rows.ts";
import { auditWords, type AuditLine } from "#lib/presentation/audit-words.ts";
import type { KeptAnswer } from "#lib/presentation/kept-words.ts";
import { useBaseMap } from "../../_components/chart/use-base-map.ts";
import { Answer } from "./answer.tsx";
import { ArrivalsPanel, type EventInView } from "./arrivals-panel.tsx";
import { ChartBar } from "./chart-bar.tsx";
import { ChartState } from "./chart-state.tsx";
import { Evidence } from "./evidence.tsx";
import styles from "./event-sheet.module.css";
import { KeptAnswers } from "./kept-answers.tsx";
import { ReadingsPanel } from "./readings-panel.tsx";
import { Unkept } from "./unkept.tsx";
import { useEventWorker, type EventWorker } from "./use-event-worker.ts";
import { useView, type ChangeView } from "./use-view.ts";
import { useWork } from "./use-work.ts";
import type { EventView } from "./view.ts";

// The map library measures the page as soon as it is loaded, which a server cannot.
const Chart = dynamic(() => import("./chart.tsx").then((module) => module.Chart), { ssr: false });

export interface EventSheetProps {
  readonly event: EventInView;
  /** Of the data folder. */
  readonly storeId: string;
  readonly arrivals: readonly ArrivalInEvent[];
  readonly observations: GatheredObservations;
  readonly settings: EstimationSettings;
  /** The same as the programming interface takes them. */
  readonly settingsJson: string;
  /** Worked out by the server, from these choices. */
  readonly solution: EventSolution;
  readonly choices: ObservationChoices;
  /** Those of the latest kept answer, or none. */
  readonly base: ObservationChoices;
  /** Latest first. */
  readonly kept: readonly KeptAnswer[];
  readonly trail: readonly AuditLine[];
}

export function EventSheet(props: EventSheetProps) {
  const { event, observations, settings, base, kept } = props;
  const stations = useMemo(() => numberedStations(observations), [observations]);
  const defaults = useMemo(() => ({ knownIds: stations.map(({ id }) => id), without: base.leftOutStationIds }), [stations, base]);
  const [view, change] = useView(defaults);
  const latestNumber = kept[0]?.number ?? 0;
  const work = useWork({ eventId: event.id, storeId: props.storeId, observations, number: latestNumber, base }, view, change);
  const window = useMemo(() => windowAround(stations.map(({ position }) => position)), [stations]);
  const { solution: served, choices: servedChoices } = props;
  const worker = useEventWorker({ observations, settings, window, solution: served, choices: servedChoices }, work.choices);
  const { drawn, isBehind, failure } = worker;
  const { baseMap } = useBaseMap(window.centreLongitudeDegrees);
  const { toggleFocus, toggleStation } = useChoices(view, change);
  const focusOn = useCallback((focus: string | null) => { change({ focus }); }, [change]);
  useOverlap(view, worker);

  // Without the worker the server works out which stations are left out, for the address holds that by now; of readings
  // it knows what was kept alone.
  const isServed = servedChoices.leftOutStationIds.join() === view.without.join();
  useEffect(() => {
    if (!isServed && drawn === null && failure !== null) globalThis.location.reload();
  }, [isServed, drawn, failure]);

  const said = { solution: drawn?.solution ?? served, stations, settings, unit: view.unit, isBehind, isWorking: isBehind && failure === null };
  return (
    <div className={styles.sheet}>
      <section className={styles.chart} aria-label="Chart">
        <div className={styles.map} data-drawn={drawn?.ask}>
          <Chart
            window={window}
            stations={stations}
            baseMap={baseMap}
            layers={drawn?.layers ?? null}
            overlap={view.showsOverlap ? worker.overlap : []}
            view={view}
            onFocus={toggleFocus}
            onChange={change}
          />
          <ChartState isDrawn={drawn !== null} isWorking={said.isWorking} isBehind={isBehind} failure={failure} />
        </div>
        <ChartBar view={view} onChange={change} />
      </section>
      <Answer title={event.title} note={event.note} without={view.without} {...said} />
      <Unkept work={work} latestNumber={latestNumber} change={changedSince(event, kept[0], props.trail)} />
      <Evidence {...said} view={view} onInclude={toggleStation} onFocus={toggleFocus} />
      <ReadingsPanel observations={observations} stations={stations} solution={said.solution} focus={view.focus} work={work} onFocus={focusOn} />
      <KeptAnswers eventId={event.id} eventRevision={event.revision} unit={view.unit} {...{ kept, stations, work, isBehind }} trail={props.trail} settingsJson={props.settingsJson} />
      <ArrivalsPanel trail={props.trail} event={event} arrivals={props.arrivals} readings={observations.readings} stations={stations} />
    </div>
  );
}

/** The last thing that was done to the event, where that was after its latest answer was kept. */
function changedSince({ id, revision }: EventInView, latest: KeptAnswer | undefined, trail: readonly AuditLine[]): string | null {
  const last = trail.find(({ action }) => action !== "localization saved");
  return latest === undefined || latest.eventRevision === revision || last === undefined ? null : auditWords(last, id);
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
    const drop = ({ key, defaultPrevented }: KeyboardEvent): void => {
      if (key === "Escape" && !defaultPrevented) change({ focus: null });
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
