import { useState } from "react";
import { useMap, useMapEvents } from "react-leaflet";
import { distanceFigure, type DistanceUnit } from "#lib/presentation/distances.ts";
import styles from "./base.module.css";

const LONGEST_PIXELS = 120;
const METRES_IN = { km: 1000, nmi: 1852 } as const satisfies Record<DistanceUnit, number>;

/** How long a round distance is, across the middle of the chart: its scale grows towards the poles. */
export function ScaleBar({ unit }: { unit: DistanceUnit }) {
  const map = useMap();
  const measure = (): number => {
    const y = map.getSize().y / 2;
    return map.distance(map.containerPointToLatLng([0, y]), map.containerPointToLatLng([1, y]));
  };
  const [metresPerPixel, setMetresPerPixel] = useState(measure);
  useMapEvents({
    moveend: () => { setMetresPerPixel(measure()); },
    resize: () => { setMetresPerPixel(measure()); },
  });
  const metres = roundBelow((metresPerPixel * LONGEST_PIXELS) / METRES_IN[unit]) * METRES_IN[unit];
  return (
    <div className={styles.scale} aria-hidden="true">
      {distanceFigure(metres, unit)} {unit}
      <svg width={metres / metresPerPixel + 2} height="9">
        <path d={`M1 0V9M1 4.5H${metres / metresPerPixel + 1}M${metres / metresPerPixel + 1} 0V9`} />
      </svg>
    </div>
  );
}

/** The largest of 1, 2, 5 times a power of ten that is not above a value. */
function roundBelow(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value));
  return power * (value >= 5 * power ? 5 : value >= 2 * power ? 2 : 1);
}
