import type { ChartArea, ChartLine } from "#lib/chart/chart-point.ts";
import type { ChartWindow } from "#lib/chart/chart-window.ts";
import { areaCopies, lineCopies } from "#lib/chart/copies.ts";
import { cutAtEdges } from "#lib/chart/cut-at-edges.ts";
import { areaIntoWindow } from "#lib/chart/into-window.ts";
import { bandPolygon, ringLine } from "#lib/chart/ring-shape.ts";
import type { Position } from "#lib/core/units/position.ts";

/** One ring to be drawn; `ask` numbers the questions, so that an answer overtaken by a newer one is dropped. */
export interface RingQuestion {
  readonly ask: number;
  readonly window: ChartWindow;
  readonly ring: { readonly centre: Position; readonly radiusMetres: number; readonly sigmaMetres: number } | null;
}

export interface DrawnRing {
  readonly line: ChartLine[];
  readonly band: ChartArea;
}

export interface RingReport {
  readonly ask: number;
  readonly ring: DrawnRing | null;
}

/** Draws away from the page, so that typing never waits for it. */
addEventListener("message", ({ data: { ask, window, ring } }: MessageEvent<RingQuestion>) => {
  const report: RingReport = { ask, ring: ring && drawn(window, ring) };
  postMessage(report);
});

function drawn(window: ChartWindow, ring: NonNullable<RingQuestion["ring"]>): DrawnRing {
  const { centre, radiusMetres, sigmaMetres } = ring;
  const polygon = bandPolygon({ centre, innerMetres: radiusMetres - sigmaMetres, outerMetres: radiusMetres + sigmaMetres });
  return {
    line: lineCopies(cutAtEdges(ringLine(window, { centre, radiusMetres }))),
    band: polygon === null ? [] : areaCopies(areaIntoWindow(window, polygon)),
  };
}
