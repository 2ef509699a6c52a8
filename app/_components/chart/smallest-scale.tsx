import type { Map as LeafletMap } from "leaflet";
import { useEffect } from "react";
import { useMap, useMapEvents } from "react-leaflet";

/** Degrees of longitude in view at the smallest scale: all stations of any event, and hardly anything twice. */
const WIDEST_DEGREES = 400;
/** The map library's world at scale 0. */
const WORLD_PIXELS = 256;

/** Lets the chart be made as small as shows the world once from side to side, on any screen, and no smaller. */
export function SmallestScale() {
  const map = useMap();
  useEffect(() => { limit(map); }, [map]);
  useMapEvents({ resize: () => { limit(map); } });
  return null;
}

function limit(map: LeafletMap): void {
  const width = map.getSize().x;
  if (width <= 0) return;
  const least = Math.max(0, Math.log2((width * 360) / WIDEST_DEGREES / WORLD_PIXELS));
  // At once: what stands on the chart next measures it.
  if (map.getZoom() < least) map.setZoom(least, { animate: false });
  map.setMinZoom(least);
}
