import { divIcon } from "leaflet";
import { CircleMarker, Marker, Pane, Polygon, Polyline } from "react-leaflet";
import type { ChartPoint } from "#lib/chart/chart-point.ts";
import type { EventLayers } from "#lib/chart/event-layers.ts";
import { probabilityFigure } from "#lib/presentation/figures.ts";
import { ruledOutMark, sourceMark } from "#lib/presentation/marks.ts";
import styles from "./chart.module.css";
import { PANES } from "./panes.ts";

/** Where the storm may have been: regions, possible sources, crossings, and the places that were ruled out. */
export function SourceLayers({ layers, showsSight }: { layers: EventLayers; showsSight: boolean }) {
  const several = layers.possibleSources.length > 1;
  return (
    <>
      <Pane name="regions" style={{ zIndex: PANES.regions }}>
        {layers.regions.map(({ probability, area }) => (
          <Polygon key={`area ${probability}`} positions={area} className={styles.region} interactive={false} smoothFactor={0} />
        ))}
        {layers.regions.map(({ probability, outline }) => (
          <Polyline key={`line ${probability}`} positions={outline} className={styles.regionLine} interactive={false} smoothFactor={0} />
        ))}
      </Pane>
      <Pane name="crossings" style={{ zIndex: PANES.crossings }}>
        {layers.crossings.flatMap(({ stations, points }) =>
          points.map((point, index) => (
            <CircleMarker key={`${stations.join(" ")} ${index}`} center={point} radius={2.5} className={styles.crossing} interactive={false} />
          )),
        )}
      </Pane>
      <Pane name="sources" style={{ zIndex: PANES.sources }}>
        {layers.ruledOut.map(({ point, reason }, index) => (
          <Letter key={`out ${index} ${reason}`} at={point} text={`×${ruledOutMark(index)}`} className={styles.ruledOut} />
        ))}
        {layers.source !== null && <CircleMarker center={layers.source} radius={4.5} className={styles.source} interactive={false} />}
        {layers.bestInWater !== null && (
          <CircleMarker center={layers.bestInWater} radius={4.5} className={styles.inWater} interactive={false} />
        )}
        {several &&
          layers.possibleSources.map(({ probability, point }, index) => (
            <PossibleSource key={sourceMark(index)} at={point} text={`${sourceMark(index)} ${probabilityFigure(probability)}`} />
          ))}
        {showsSight && layers.sightLines.map(({ stationId, blockedAt }) =>
          blockedAt === null ? null : <Letter key={`block ${stationId}`} at={blockedAt} text="|" className={styles.block} />,
        )}
      </Pane>
    </>
  );
}

function PossibleSource({ at, text }: { at: ChartPoint; text: string }) {
  return (
    <>
      <CircleMarker center={at} radius={4.5} className={styles.source} interactive={false} />
      <Letter at={at} text={text} className={styles.sourceLetter} />
    </>
  );
}

/** Words on the chart. The same stand in the list beside it, which is what is read out. */
function Letter({ at, text, className }: { at: ChartPoint; text: string; className: string | undefined }) {
  const span = document.createElement("span");
  span.textContent = text;
  span.ariaHidden = "true";
  const icon = divIcon({ html: span, className: className ?? "", iconSize: [0, 0] });
  return <Marker position={at} icon={icon} interactive={false} keyboard={false} />;
}
