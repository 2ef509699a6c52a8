"use client";

import { latLngBounds, type LatLngBounds } from "leaflet";
import { useMemo, useState } from "react";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { ChartArea, ChartPoint } from "#lib/chart/chart-point.ts";
import { pointInWindow, type ChartWindow } from "#lib/chart/chart-window.ts";
import type { EventLayers } from "#lib/chart/event-layers.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { WorldChart } from "../../_components/chart/world-chart.tsx";
import { ChartPlacing } from "./chart-placing.tsx";
import { RingLayers } from "./ring-layers.tsx";
import { SourceLayers } from "./source-layers.tsx";
import { StationMarks } from "./station-marks.tsx";
import type { ChangeView } from "./use-view.ts";
import type { EventView } from "./view.ts";

export interface ChartProps {
  readonly window: ChartWindow;
  readonly stations: readonly NumberedStation[];
  readonly baseMap: BaseMap | null;
  /** Null until the first drawing is done. */
  readonly layers: EventLayers | null;
  readonly overlap: readonly ChartArea[];
  readonly view: EventView;
  readonly onFocus: (id: string) => void;
  readonly onChange: ChangeView;
}

/** The chart of one event. */
export function Chart(props: ChartProps) {
  const { window, stations, layers } = props;
  if (layers === null) return null;
  return <DrawnChart {...props} layers={layers} key={`${window.centreLongitudeDegrees} ${stations.length}`} />;
}

function DrawnChart(props: ChartProps & { layers: EventLayers }) {
  const { window, stations, layers, view } = props;
  const whole = useMemo(() => extent(window, stations, layers), [window, stations, layers]);
  // Where the chart opens. Later answers leave it where it is.
  const [opensOn] = useState(whole);
  return (
    <WorldChart
      bounds={opensOn}
      middle={window.centreLongitudeDegrees}
      baseMap={props.baseMap}
      unit={view.unit}
      name="Map of stations, rings and sources."
      placing={<ChartPlacing whole={whole} place={view.place} onChange={props.onChange} />}
    >
      <RingLayers layers={layers} overlap={props.overlap} view={view} />
      <SourceLayers layers={layers} showsSight={view.showsSight} />
      <StationMarks window={window} stations={stations} view={view} onFocus={props.onFocus} />
    </WorldChart>
  );
}

/** What must be seen at first: every station, and every place where the storm may have been. */
function extent(window: ChartWindow, stations: readonly NumberedStation[], layers: EventLayers): LatLngBounds {
  const middle = window.centreLongitudeDegrees;
  const [widest] = layers.regions;
  const lines = widest === undefined ? layers.rings.flatMap(({ line }) => line) : widest.outline;
  const places: ChartPoint[] = [
    ...stations.map(({ position }) => pointInWindow(window, position)),
    ...layers.possibleSources.map(({ point }) => point),
    ...(layers.ruledOut.length <= FEW ? layers.ruledOut.map(({ point }) => point) : []),
    ...lines.flat().filter(([, longitude]) => Math.abs(longitude - middle) <= 180),
  ];
  const shown = places.map(([latitude, longitude]): ChartPoint => [Math.max(-78, Math.min(80, latitude)), longitude]);
  return latLngBounds(shown);
}

/** More places than this that the storm did not stand at need not all be seen at first. */
const FEW = 4;
