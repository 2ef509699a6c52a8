"use client";

import { divIcon, latLngBounds, type LatLngBounds } from "leaflet";
import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import { Marker, Pane, Polygon, Polyline, useMap, useMapEvents } from "react-leaflet";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { ChartPoint } from "#lib/chart/chart-point.ts";
import { pointInWindow, type ChartWindow } from "#lib/chart/chart-window.ts";
import { wrapLongitudeDegrees, type Position } from "#lib/core/units/position.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import { ShowAll } from "../_components/chart/show-all.tsx";
import { WorldChart } from "../_components/chart/world-chart.tsx";
import styles from "./place-chart.module.css";
import type { DrawnRing } from "./ring-worker.ts";

export interface PlaceChartProps {
  readonly window: ChartWindow;
  readonly station: { readonly name: string; readonly position: Position } | null;
  readonly baseMap: BaseMap | null;
  readonly ring: DrawnRing | null;
  readonly unit: DistanceUnit;
  /** Where a click puts a new station; null where none is being placed. */
  readonly onPlace: ((position: Position) => void) | null;
}

/** The station with its ring and band. */
export function PlaceChart({ window, station, baseMap, ring, unit, onPlace }: PlaceChartProps) {
  const middle = window.centreLongitudeDegrees;
  const whole = useMemo(() => extent(window, station?.position ?? null, ring), [window, station, ring]);
  const [opensOn] = useState(whole);
  return (
    <WorldChart
      bounds={opensOn}
      middle={middle}
      baseMap={baseMap}
      unit={unit}
      name="Map of the station and its ring."
      placing={<Placing whole={whole} middle={middle} onPlace={onPlace} />}
    >
      <Pane name="bands" style={{ zIndex: 300 }}>
        {ring !== null && <Polygon positions={ring.band} className={styles.band} interactive={false} smoothFactor={0} />}
      </Pane>
      <Pane name="rings" style={{ zIndex: 320 }}>
        {ring !== null && <Polyline positions={ring.line} className={styles.ring} interactive={false} smoothFactor={0} />}
      </Pane>
      {station !== null && <Marker position={pointInWindow(window, station.position)} icon={MARK} title={station.name} alt={station.name} keyboard={false} interactive={false} />}
    </WorldChart>
  );
}

const MARK = divIcon({ html: "", className: styles.station ?? "", iconSize: [14, 14] });

/** Shows the whole ring until somebody moves the chart, and takes clicks where a station is to be placed. */
function Placing({ whole, middle, onPlace }: { whole: LatLngBounds; middle: number; onPlace: PlaceChartProps["onPlace"] }) {
  const map = useMap();
  const isMoved = useRef(false);
  const show = useCallback((bounds: LatLngBounds) => { map.fitBounds(bounds, { animate: false, padding: [26, 26] }); }, [map]);
  // By the hand's own events: the map library moves the chart for reasons of its own as well.
  useEffect(() => {
    const container = map.getContainer();
    const touch = (event: Event): void => {
      const isButton = event.target instanceof Element && event.target.closest("button") !== null;
      const isPassing = event instanceof KeyboardEvent && event.key === "Tab";
      if (!isButton && !isPassing) isMoved.current = true;
    };
    for (const type of ["pointerdown", "wheel", "keydown"]) container.addEventListener(type, touch, { passive: true });
    return () => { for (const type of ["pointerdown", "wheel", "keydown"]) container.removeEventListener(type, touch); };
  }, [map]);
  // The chart grows and shrinks with the words above it, which the map library does not see by itself.
  useEffect(() => {
    const observer = new ResizeObserver(() => { map.invalidateSize({ animate: false, pan: false }); });
    observer.observe(map.getContainer());
    return () => { observer.disconnect(); };
  }, [map]);
  useEffect(() => { map.setMaxBounds([[-86, middle - 200], [86, middle + 200]]); }, [map, middle]);
  useEffect(() => { if (!isMoved.current) show(whole); }, [show, whole]);
  useMapEvents({
    resize: () => { if (!isMoved.current) show(whole); },
    click: ({ latlng: { lat, lng } }) => {
      if (onPlace === null) return;
      onPlace({ latitudeDegrees: lat, longitudeDegrees: wrapLongitudeDegrees(lng) });
    },
  });
  const showAll = (): void => {
    isMoved.current = false;
    show(whole);
  };
  return <ShowAll onShow={showAll} />;
}

/** The station with its whole ring; without a ring what lies around it, and without a station the world. */
function extent(window: ChartWindow, position: Position | null, ring: DrawnRing | null): LatLngBounds {
  const middle = window.centreLongitudeDegrees;
  if (position === null) return latLngBounds([[-65, middle - 175], [72, middle + 175]]);
  const at = pointInWindow(window, position);
  const points = [...(ring?.line ?? []), ...(ring?.band ?? []).flat()].flat().filter(([, longitude]) => Math.abs(longitude - middle) <= 180);
  const shown = points.length > 0 ? [at, ...points] : [[at[0] - 22, at[1] - 40], [at[0] + 22, at[1] + 40]];
  return latLngBounds(shown.map(([latitude = 0, longitude = 0]): ChartPoint => [Math.max(-78, Math.min(80, latitude)), longitude]));
}
