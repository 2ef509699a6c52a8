import { point, type Map as LeafletMap } from "leaflet";
import { useEffect } from "react";
import { useMap } from "react-leaflet";

/**
 * Keeps the fractions of pixels in lines and areas. The map library rounds each vertex to a whole pixel, which makes
 * a ring of many short sides tremble. Stands before the layers, so that they are placed after it.
 */
export function ExactLines() {
  const map = useMap();
  useEffect(() => {
    keepFractions(map);
  }, [map]);
  return null;
}

function keepFractions(map: LeafletMap): void {
  map.latLngToLayerPoint = (at) => {
    const { x, y } = map.project(at);
    const origin = map.getPixelOrigin();
    return point(x - origin.x, y - origin.y);
  };
}
