import type { ChartArea, ChartLine, ChartPoint } from "./chart-point.ts";

/** The chart goes round the world: what is drawn once is drawn again one turn to the west and one to the east. */
const TURNS_DEGREES = [-360, 0, 360] as const;

export function lineCopies(lines: readonly ChartLine[]): ChartLine[] {
  return TURNS_DEGREES.flatMap((turn) => lines.map((line) => shifted(line, turn)));
}

/** One area with its copies in it, so that parts which meet at an edge are painted in one stroke and show no seam. */
export function areaCopies(area: ChartArea): ChartArea {
  return TURNS_DEGREES.flatMap((turn) => area.map((polygon) => polygon.map((line) => shifted(line, turn))));
}

function shifted(line: ChartLine, turnDegrees: number): ChartLine {
  return line.map(([latitude, longitude]): ChartPoint => [latitude, longitude + turnDegrees]);
}
