import { memo } from "react";
import { Pane, Polygon, Polyline } from "react-leaflet";
import type { BaseMap } from "#lib/chart/base-map.ts";
import type { ChartLine } from "#lib/chart/chart-point.ts";
import { areaCopies, lineCopies } from "#lib/chart/copies.ts";
import { EDGE_LATITUDE_DEGREES } from "#lib/chart/cut-at-edges.ts";
import styles from "./base.module.css";
import { BASE_PANES } from "./base-panes.ts";

const STEP_DEGREES = 30;
/** Charts are held within 200 degrees of their middle. Land takes most of the time in which a chart first comes up. */
const REACH_DEGREES = 230;

/** Natural Earth's land and coast, over a net of meridians and parallels. It never changes, so it is drawn once. */
export const BaseMapLayers = memo(function BaseMapLayers({ baseMap, middle }: { baseMap: BaseMap | null; middle: number }) {
  const reach = { middleDegrees: middle, degrees: REACH_DEGREES };
  return (
    <>
      <Pane name="graticule" style={{ zIndex: BASE_PANES.graticule }}>
        <Polyline positions={graticule(middle)} className={styles.graticule} interactive={false} />
      </Pane>
      {baseMap !== null && (
        <>
          <Pane name="land" style={{ zIndex: BASE_PANES.land }}>
            <Polygon positions={areaCopies(baseMap.land, reach)} className={styles.land} interactive={false} />
          </Pane>
          <Pane name="coast" style={{ zIndex: BASE_PANES.coast }}>
            <Polyline positions={lineCopies(baseMap.coast, reach)} className={styles.coast} interactive={false} />
          </Pane>
        </>
      )}
    </>
  );
});

function graticule(middle: number): ChartLine[] {
  const west = Math.floor((middle - 400) / STEP_DEGREES) * STEP_DEGREES;
  const east = west + 840;
  const lines: ChartLine[] = [];
  for (let longitude = west; longitude <= east; longitude += STEP_DEGREES) {
    lines.push([[-EDGE_LATITUDE_DEGREES, longitude], [EDGE_LATITUDE_DEGREES, longitude]]);
  }
  for (let latitude = -60; latitude <= 60; latitude += STEP_DEGREES) {
    lines.push([[latitude, west], [latitude, east]]);
  }
  return lines;
}
