import { useEffect, useId, useRef, useState, type RefObject } from "react";
import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import type { Reading } from "#lib/core/arrival/reading.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import { linePlot } from "#lib/presentation/line-plot.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import styles from "./findings.module.css";

const HEIGHT = 180;

/** The readings and their line: time in UTC to the right, period upwards from long to short. */
export function LinePlot({ readings, estimate, settings }: { readings: readonly Reading[]; estimate: ArrivalEstimate | null; settings: EstimationSettings }) {
  const box = useRef<HTMLDivElement>(null);
  const width = useWidth(box);
  const clip = useId();
  const size = { width, height: HEIGHT, left: 34, right: 10, top: 18, bottom: 34 };
  const plot = linePlot({ readings, estimate, settings, size });
  return (
    <div ref={box} className={styles.plot}>
      {plot !== null && (
        <svg width={width} height={HEIGHT} viewBox={`0 0 ${width} ${HEIGHT}`} role="img" aria-label={`${counted(readings.length, "reading")} by time and period${estimate === null ? "" : ", with the fitted line and its spread"}`}>
          <defs>
            <clipPath id={clip}><rect x={size.left} y={size.top} width={width - size.left - size.right} height={HEIGHT - size.top - size.bottom} /></clipPath>
          </defs>
          <text className={styles.axis} x="0" y="11">period, s</text>
          {plot.periods.map(({ y, label }) => (
            <g key={label}>
              <path className={styles.net} d={`M${size.left} ${y}H${width - size.right}`} />
              <text className={styles.axis} x={size.left - 6} y={y + 4} textAnchor="end">{label}</text>
            </g>
          ))}
          {plot.times.map(({ x, label, day }) => (
            <g key={x}>
              <path className={styles.net} d={`M${x} ${size.top}V${HEIGHT - size.bottom}`} />
              <text className={styles.axis} x={x} y={HEIGHT - size.bottom + 14} textAnchor="middle">{label}</text>
              <text className={styles.axis} x={x} y={HEIGHT - size.bottom + 28} textAnchor="middle">{day}</text>
            </g>
          ))}
          <g clipPath={`url(#${clip})`}>
            <path className={styles.spread} d={plot.spread} />
            <path className={styles.asRead} d={plot.asRead} />
            <path className={styles.line} d={plot.line} />
            {plot.dots.map(({ row, x, y, x1, x2, y1, y2 }) => (
              <g key={`${row} ${x}`}>
                <path className={styles.error} d={`M${x1} ${y}H${x2}M${x} ${y1}V${y2}`} />
                <circle className={styles.dot} cx={x} cy={y} r="3.5" />
              </g>
            ))}
          </g>
          <text className={styles.axis} x={width - size.right} y="11" textAnchor="end">UTC</text>
        </svg>
      )}
    </div>
  );
}

function useWidth(box: RefObject<HTMLDivElement | null>): number {
  const [width, setWidth] = useState(480);
  useEffect(() => {
    const element = box.current;
    if (element === null) return;
    const observer = new ResizeObserver(([entry]) => {
      const measured = entry?.contentRect.width ?? 0;
      if (measured > 0) setWidth(Math.round(measured));
    });
    observer.observe(element);
    return () => { observer.disconnect(); };
  }, [box]);
  return width;
}
