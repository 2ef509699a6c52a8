import type { LatLngBounds, Map as LeafletMap } from "leaflet";
import type { ReactNode } from "react";
import { MapContainer, ZoomControl } from "react-leaflet";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { DistanceUnit } from "#lib/presentation/distances.ts";
import { BaseMapLayers } from "./base-map-layers.tsx";
import base from "./base.module.css";
import { ExactLines } from "./exact-lines.tsx";
import { ScaleBar } from "./scale-bar.tsx";
import { SmallestScale } from "./smallest-scale.tsx";

/** Half the width of what a chart may show, in degrees of longitude: the world once, and a little. */
const HALF_WIDTH_DEGREES = 200;

/**
 * A chart of the world about a meridian, with its land, scale and buttons; what stands on it are its children. It has
 * the map library's own keys: arrows move it, plus and minus change its scale. Does not glide for readers who want no
 * motion.
 */
export function WorldChart(props: {
  /** Where it opens; later bounds leave it where it is. */
  bounds: LatLngBounds;
  middle: number;
  baseMap: BaseMap | null;
  unit: DistanceUnit;
  /** What it shows, for those who hear it. */
  name: string;
  maxZoom?: number;
  /** Stands before the land and places the chart once its smallest scale is known. */
  placing?: ReactNode;
  children: ReactNode;
}) {
  const { bounds, middle, baseMap, unit, name, maxZoom = 8 } = props;
  const glides = !globalThis.matchMedia("(prefers-reduced-motion: reduce)").matches;
  return (
    <MapContainer
      ref={(map: LeafletMap | null) => { nameChart(map, name); }}
      className={base.chart ?? ""}
      bounds={bounds}
      maxBounds={[[-86, middle - HALF_WIDTH_DEGREES], [86, middle + HALF_WIDTH_DEGREES]]}
      maxBoundsViscosity={1}
      minZoom={0}
      maxZoom={maxZoom}
      zoomSnap={0.25}
      zoomAnimation={glides}
      fadeAnimation={glides}
      inertia={glides}
      zoomControl={false}
      attributionControl={false}
    >
      <ExactLines />
      <SmallestScale />
      {props.placing}
      <BaseMapLayers baseMap={baseMap} middle={middle} />
      {props.children}
      <ZoomControl position="topleft" />
      <ScaleBar unit={unit} />
    </MapContainer>
  );
}

function nameChart(map: LeafletMap | null, name: string): void {
  const container = map?.getContainer();
  container?.setAttribute("role", "region");
  container?.setAttribute("aria-label", `${name} Arrow keys move it, plus and minus change its scale.`);
}
