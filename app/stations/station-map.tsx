"use client";

import { circleMarker, divIcon, latLngBounds, layerGroup, type CircleMarker, type LatLngBounds } from "leaflet";
import { useEffect, useMemo, useRef, useState } from "react";
import { Marker, useMap } from "react-leaflet";
import type { ChartPoint } from "#lib/chart/chart-point.ts";
import { pointInWindow, windowAround, type ChartWindow } from "#lib/chart/chart-window.ts";
import type { RegisterRow } from "#lib/presentation/register-rows.ts";
import { useBaseMap } from "../_components/chart/use-base-map.ts";
import { ShowAll } from "../_components/chart/show-all.tsx";
import { WorldChart } from "../_components/chart/world-chart.tsx";
import styles from "./station-map.module.css";

interface MapProps {
  readonly all: readonly RegisterRow[];
  readonly shown: readonly RegisterRow[];
  readonly chosenId: string | null;
  readonly onChoose: (id: string | null) => void;
}

/** The stations that the table shows, each a dot that chooses it. By keyboard they are chosen in the table. */
export function StationMap(props: MapProps) {
  const window = useMemo(() => windowAround(props.all.map(({ position }) => position)), [props.all]);
  return <PlacedMap {...props} window={window} key={window.centreLongitudeDegrees} />;
}

function PlacedMap({ all, shown, chosenId, onChoose, window }: MapProps & { window: ChartWindow }) {
  const middle = window.centreLongitudeDegrees;
  const { baseMap, failure } = useBaseMap(middle);
  const [opensOn] = useState(() => extent(window, all));
  const chosen = all.find(({ id }) => id === chosenId) ?? null;
  return (
    <>
      <WorldChart bounds={opensOn} middle={middle} baseMap={baseMap} unit="km" name="Map of stations; they are chosen in the table." maxZoom={10}>
        <Dots window={window} shown={shown} chosenId={chosenId} onChoose={onChoose} />
        {chosen !== null && <Chosen key={chosen.id} window={window} row={chosen} />}
        <ShowAllStations window={window} shown={shown} />
      </WorldChart>
      {failure !== null && <p className={styles.failure} role="status">The land could not be drawn: {failure} The stations stand where they are.</p>}
    </>
  );
}

/** Dots in one layer of the map library's own: thousands of components would be made anew with each letter of a filter. */
function Dots({ window, shown, chosenId, onChoose }: Omit<MapProps, "all"> & { window: ChartWindow }) {
  const map = useMap();
  const dots = useRef(new Map<string, CircleMarker>());
  const choose = useRef(onChoose);
  useEffect(() => { choose.current = onChoose; }, [onChoose]);
  useEffect(() => {
    const radius = shown.length > MANY ? 3 : 5;
    const own = new Map(shown.map((row) => [row.id, dot(window, row, radius, (id) => { choose.current(id); })]));
    const layer = layerGroup([...own.values()]).addTo(map);
    for (const { id, name } of shown) nameDot(own.get(id)?.getElement(), `${name}, ${id}`);
    dots.current = own;
    return () => { layer.remove(); };
  }, [map, window, shown]);
  useEffect(() => {
    const one = chosenId === null ? undefined : dots.current.get(chosenId);
    one?.getElement()?.setAttribute("data-chosen", "");
    one?.bringToFront();
    return () => { one?.getElement()?.removeAttribute("data-chosen"); };
  }, [chosenId, shown, window]);
  return null;
}

/** Of more stations than this, dots of the usual size would hide one another. */
const MANY = 300;

function dot(window: ChartWindow, { id, position }: RegisterRow, radius: number, choose: (id: string) => void): CircleMarker {
  const marker = circleMarker(pointInWindow(window, position), { radius, className: styles.dot ?? "", bubblingMouseEvents: false });
  return marker.on("click", () => { choose(id); });
}

function nameDot(element: Element | undefined, words: string): void {
  if (element === undefined) return;
  const title = document.createElementNS("http://www.w3.org/2000/svg", "title");
  title.textContent = words;
  element.append(title);
}

/** The chosen station's name beside its dot; the chart moves only where the dot is out of view. */
function Chosen({ window, row }: { window: ChartWindow; row: RegisterRow }) {
  const map = useMap();
  const [latitude, longitude] = pointInWindow(window, row.position);
  // Towards the middle, where there is room for it.
  const side = (longitude > window.centreLongitudeDegrees ? styles.west : styles.east) ?? "";
  const icon = useMemo(() => {
    const label = document.createElement("span");
    label.textContent = row.name;
    return divIcon({ html: label, className: `${styles.name ?? ""} ${side}`, iconSize: [0, 0] });
  }, [row.name, side]);
  useEffect(() => {
    const at = { lat: latitude, lng: longitude };
    if (!map.getBounds().pad(-0.05).contains(at)) map.panTo(at, { animate: false });
  }, [map, latitude, longitude]);
  return <Marker position={{ lat: latitude, lng: longitude }} icon={icon} interactive={false} keyboard={false} />;
}

function ShowAllStations({ window, shown }: { window: ChartWindow; shown: readonly RegisterRow[] }) {
  const map = useMap();
  return <ShowAll onShow={() => { map.fitBounds(extent(window, shown), { animate: false, padding: [28, 28] }); }} />;
}

/** All of the rows with some sea around them, and for one station the coast that it stands at; a good part of the window where there are none. */
function extent(window: ChartWindow, rows: readonly RegisterRow[]): LatLngBounds {
  const middle = window.centreLongitudeDegrees;
  const points: ChartPoint[] = rows.length === 0 ? [[-60, middle - 150], [70, middle + 150]] : rows.map(({ position }) => pointInWindow(window, position));
  const bounds = latLngBounds(points);
  const margin = Math.max(LEAST_DEGREES, 0.06 * Math.max(bounds.getNorth() - bounds.getSouth(), bounds.getEast() - bounds.getWest()));
  return latLngBounds(
    { lat: Math.max(-80, bounds.getSouth() - margin), lng: bounds.getWest() - margin },
    { lat: Math.min(82, bounds.getNorth() + margin), lng: bounds.getEast() + margin },
  );
}

const LEAST_DEGREES = 2;
