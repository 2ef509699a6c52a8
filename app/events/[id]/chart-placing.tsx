import type { LatLngBounds, Map as LeafletMap } from "leaflet";
import { useCallback, useEffect, useRef } from "react";
import { useMap, useMapEvents } from "react-leaflet";
import { ShowAll } from "../../_components/chart/show-all.tsx";
import type { ChangeView } from "./use-view.ts";
import { placeText, type ChartPlace } from "./view.ts";

/** What the scale bar takes at the chart's foot. */
const SCALE_BAR_PIXELS = 44;

/**
 * Keeps the chart where the view says and the view where the reader has put the chart, and offers the way back to the
 * whole event. Stands behind what limits the scale.
 */
export function ChartPlacing({ whole, place, onChange }: { whole: LatLngBounds; place: ChartPlace | null; onChange: ChangeView }) {
  const map = useMap();
  /** The bounds last shown whole, and where that put the chart. */
  const shown = useRef<{ bounds: LatLngBounds; at: string } | null>(null);
  const isFitting = useRef(false);
  const showWhole = useCallback((bounds: LatLngBounds) => {
    isFitting.current = true;
    map.fitBounds(bounds, { animate: false, paddingTopLeft: [28, 28], paddingBottomRight: [28, SCALE_BAR_PIXELS] });
    isFitting.current = false;
    shown.current = { bounds, at: placeText(placeOf(map)) };
    onChange({ place: null });
  }, [map, onChange]);

  useMapEvents({
    moveend: () => {
      if (isFitting.current) return;
      const now = placeOf(map);
      const isWhole = shown.current?.at === placeText(now);
      if (isWhole && place !== null) onChange({ place: null });
      if (!isWhole && (place === null || placeText(place) !== placeText(now))) onChange({ place: now });
    },
    // A chart that nobody has moved goes on showing all of the event when the screen changes.
    resize: () => { if (place === null && shown.current !== null) showWhole(shown.current.bounds); },
  });
  useEffect(() => {
    const now = placeText(placeOf(map));
    if (place === null) {
      if (shown.current?.at !== now) showWhole(shown.current?.bounds ?? whole);
    } else if (placeText(place) !== now) {
      map.setView({ lat: place.latitudeDegrees, lng: place.longitudeDegrees }, place.zoom, { animate: false });
    }
  }, [map, place, whole, showWhole]);

  return <ShowAll onShow={() => { showWhole(whole); }} />;
}

function placeOf(map: LeafletMap): ChartPlace {
  const { lat, lng } = map.getCenter();
  return { latitudeDegrees: lat, longitudeDegrees: lng, zoom: map.getZoom() };
}
