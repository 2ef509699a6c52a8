import { Fragment } from "react";
import { Pane, Polygon, Polyline } from "react-leaflet";
import type { ChartArea } from "#lib/chart/chart-point.ts";
import type { EventLayers, RingLayer } from "#lib/chart/event-layers.ts";
import styles from "./chart.module.css";
import { PANES } from "./panes.ts";
import type { EventView } from "./view.ts";

/** Rings, bands and sight lines. Grey and thin but for the station in focus, which is drawn last and so lies on top. */
export function RingLayers(props: { layers: EventLayers; overlap: readonly ChartArea[]; view: EventView }) {
  const { layers, overlap, view } = props;
  const rings = [...layers.rings].sort((a, b) => Number(a.stationId === view.focus) - Number(b.stationId === view.focus));
  const opacity = overlapOpacity(overlap.length);
  return (
    <>
      <Pane name="bands" style={{ zIndex: PANES.bands }}>
        {rings.map((ring) => (
          <Polygon
            key={keyOf(ring, view)}
            positions={ring.band}
            className={ring.stationId === view.focus ? styles.focusBand : styles.band}
            interactive={false}
            smoothFactor={0}
          />
        ))}
      </Pane>
      <Pane name="overlap" style={{ zIndex: PANES.overlap }}>
        {overlap.map((area, index) => (
          <Polygon key={index} positions={area} className={styles.overlap} fillOpacity={opacity} interactive={false} smoothFactor={0} />
        ))}
      </Pane>
      <Pane name="rings" style={{ zIndex: PANES.rings }}>
        {rings.map((ring) => (
          <Polyline
            key={keyOf(ring, view)}
            positions={ring.line}
            className={ring.stationId === view.focus ? styles.focusRing : styles.ring}
            interactive={false}
            smoothFactor={0}
          />
        ))}
      </Pane>
      <Pane name="sight" style={{ zIndex: PANES.sight }}>
        {view.showsSight &&
          layers.sightLines.map(({ stationId, open, beyond }) => (
            <Fragment key={stationId}>
              <Polyline positions={open} className={styles.sight} interactive={false} smoothFactor={0} />
              {beyond.length > 0 && (
                <Polyline positions={beyond} className={styles.blockedSight} interactive={false} smoothFactor={0} />
              )}
            </Fragment>
          ))}
      </Pane>
    </>
  );
}

/** Where all bands meet the overlaps together are this dark, however many they are, so that the regions stand out. */
const DARKEST = 0.2;

/** Of one of several areas painted over one another. */
function overlapOpacity(areas: number): number {
  return 1 - (1 - DARKEST) ** (1 / Math.max(2, areas));
}

/** The map library sets a shape's class once, when it makes it: a change of focus makes the shape anew. */
function keyOf(ring: RingLayer, view: EventView): string {
  return `${ring.stationId} ${ring.stationId === view.focus ? "focus" : ""}`;
}
