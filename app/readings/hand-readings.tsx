"use client";

import dynamic from "next/dynamic";
import { useState } from "react";
import { hasWork, useDraft } from "./use-draft.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import type { DraftShelf } from "../_components/draft-shelf.ts";
import { useBaseMap } from "../_components/chart/use-base-map.ts";
import { FindingsPart, Summary } from "./findings-part.tsx";
import form from "./form.module.css";
import styles from "./hand-readings.module.css";
import { DoneReport, KeepPart, type EventChoice } from "./keep-part.tsx";
import { ReadingRows } from "./reading-rows.tsx";
import type { StationChoice } from "./station-choice.ts";
import { StationPart } from "./station-part.tsx";
import { useBringingIn } from "./use-bringing-in.ts";
import { useLeftFields } from "./use-left-fields.ts";
import { useReadingView } from "./use-reading-view.ts";
import { useRingWorker } from "./use-ring-worker.ts";
import { workOut } from "./work-out.ts";

// The map library measures the page as soon as it is loaded, which a server cannot.
const PlaceChart = dynamic(() => import("./place-chart.tsx").then((module) => module.PlaceChart), { ssr: false });

/** Periods timed by hand, worked out as they are typed, and brought in as a station's arrival. */
export function HandReadings({ shelf, ...props }: { shelf: DraftShelf; stations: readonly StationChoice[]; events: readonly EventChoice[] }) {
  const [opening] = useState(() => new URLSearchParams(globalThis.location.search));
  const { draft, change, isRestored } = useDraft(shelf, { station: opening.get("station"), event: opening.get("event"), hasStations: props.stations.length > 0 });
  const [isOld, setIsOld] = useState(isRestored);
  const left = useLeftFields();
  const bringing = useBringingIn({ draft, change, left, ...props });
  const { stations, events, keeping, bringIn } = bringing;
  const [unit, setUnit] = useReadingView(draft);
  const work = workOut(draft, stations, DEFAULT_SETTINGS);
  const drawn = useRingWorker({ window: work.window, ring: work.ring });
  const { baseMap, failure } = useBaseMap(work.window.centreLongitudeDegrees);
  const place = (part: { latitudeDegrees: number; longitudeDegrees: number }): void => {
    const placed = { ...draft.station.placed, latitude: part.latitudeDegrees.toFixed(2), longitude: part.longitudeDegrees.toFixed(2) };
    change({ kind: "station", part: { placed } });
  };
  const startAnew = (): void => {
    change({ kind: "anew" });
    left.forget();
    keeping.forget();
    setIsOld(false);
  };
  return (
    <form className={styles.sheet} aria-label="Hand readings" onSubmit={(event) => { event.preventDefault(); }}>
      <div className={styles.entry}>
        <div className={styles.head}>
          <h1 className={styles.title}>Hand readings</h1>
          <button type="button" className={form.button} disabled={!hasWork(draft)} onClick={startAnew}>Start anew</button>
        </div>
        <p role="status" className={form.hint}>
          {isOld && keeping.done === null && hasWork(draft) && "What was typed here earlier and not brought in is back."}
        </p>
        <DoneReport done={keeping.done} />
        <StationPart
          {...{ draft, stations, change }}
          chosen={work.chosen}
          deployment={work.deployment}
          placed={work.placed}
          message={bringing.stationMessage}
          shownIssues={[...work.placed.issues.filter(({ field }) => left.isShown(`placed-${field}`)), ...keeping.refused.placed]}
          onLeave={(field) => { left.leave([`placed-${field}`]); }}
        />
        <ReadingRows
          {...{ draft, change }}
          reads={work.reads}
          zone={work.zone}
          stationZone={work.stationZone}
          shownIssues={bringing.rowIssues}
          onLeave={(key, fields) => { left.leave(fields.map((field) => `${key}-${field}`)); }}
        />
      </div>
      <div id="findings" className={styles.results}>
        <FindingsPart findings={work.findings} typed={work.typed} settings={DEFAULT_SETTINGS} unit={unit} onUnit={setUnit} />
        <section className={styles.map} aria-label="Chart" data-drawn={drawn.ring === null ? undefined : drawn.drawing}>
          <PlaceChart window={work.window} station={work.mark} baseMap={baseMap} ring={drawn.ring} unit={unit} onPlace={draft.station.way === "new" ? place : null} />
          {(drawn.failure ?? failure) !== null && <p role="alert" className={styles.failure}>The map is not whole: {drawn.failure ?? failure} The figures stand.</p>}
        </section>
      </div>
      <div className={styles.keep}>
        <KeepPart
          {...{ draft, events, keeping, change }}
          titleMessage={bringing.titleMessage}
          eventMessage={bringing.eventMessage}
          onLeaveTitle={() => { if (draft.keep.title.trim() !== "") left.leave(["title"]); }}
          onBringIn={bringIn}
        />
        <p className={styles.caution}>Timing only, not height. Not for navigation and not a warning service: official warnings and licensed judgement come first.</p>
      </div>
      <Summary findings={work.findings} unit={unit} />
    </form>
  );
}
