import { divIcon, type LeafletKeyboardEvent, type Marker as LeafletMarker } from "leaflet";
import { useEffect, useMemo, useRef } from "react";
import { Marker } from "react-leaflet";
import { pointInWindow, type ChartWindow } from "#lib/chart/chart-window.ts";
import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import styles from "./chart.module.css";
import type { EventView } from "./view.ts";

/** The stations by their numbers; each puts itself in focus, by mouse or keyboard. */
export function StationMarks(props: {
  window: ChartWindow;
  stations: readonly NumberedStation[];
  view: EventView;
  onFocus: (id: string) => void;
}) {
  const { view } = props;
  return props.stations.map((station) => (
    <StationMark
      key={station.id}
      {...props}
      station={station}
      isInFocus={view.focus === station.id}
      isLeftOut={view.without.includes(station.id)}
    />
  ));
}

function StationMark(props: {
  window: ChartWindow;
  station: NumberedStation;
  isInFocus: boolean;
  isLeftOut: boolean;
  onFocus: (id: string) => void;
}) {
  const { station, isInFocus, isLeftOut, onFocus } = props;
  const mark = useRef<LeafletMarker>(null);
  const icon = useMemo(
    () => divIcon({ html: String(station.number), className: styles.station ?? "", iconSize: [24, 24] }),
    [station.number],
  );
  useEffect(() => {
    const element = mark.current?.getElement();
    element?.setAttribute("aria-label", `Station ${station.number} ${station.name}${isLeftOut ? ", left out" : ""}`);
    element?.setAttribute("aria-pressed", String(isInFocus));
    element?.toggleAttribute("data-left-out", isLeftOut);
  }, [station, isInFocus, isLeftOut]);
  return (
    <Marker
      ref={mark}
      position={pointInWindow(props.window, station.position)}
      icon={icon}
      title={station.name}
      zIndexOffset={isInFocus ? 1000 : 0}
      eventHandlers={{
        click: () => { onFocus(station.id); },
        keydown: (event: LeafletKeyboardEvent) => {
          const { key } = event.originalEvent;
          if (key !== "Enter" && key !== " ") return;
          event.originalEvent.preventDefault();
          onFocus(station.id);
        },
      }}
    />
  );
}
