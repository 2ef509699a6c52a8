import type { ChartArea, ChartLine, ChartPoint } from "./chart-point.ts";

/** The chart goes round the world: what is drawn once is drawn again one turn to the west and one to the east. */
const TURNS_DEGREES = [-360, 0, 360] as const;

/** How far a chart can be moved: copies that lie beyond it altogether need not be made. */
export interface ChartReach {
  readonly middleDegrees: number;
  readonly degrees: number;
}

export function lineCopies(lines: readonly ChartLine[], reach?: ChartReach): ChartLine[] {
  return TURNS_DEGREES.flatMap((turn) => lines.filter((line) => isInReach(line, turn, reach)).map((line) => shifted(line, turn)));
}

/** One area with its copies in it, so that parts which meet at an edge are painted in one stroke and show no seam. */
export function areaCopies(area: ChartArea, reach?: ChartReach): ChartArea {
  return TURNS_DEGREES.flatMap((turn) =>
    area.filter((polygon) => polygon.some((line) => isInReach(line, turn, reach))).map((polygon) => polygon.map((line) => shifted(line, turn))),
  );
}

function isInReach(line: ChartLine, turnDegrees: number, reach: ChartReach | undefined): boolean {
  return reach === undefined || line.some(([, longitude]) => Math.abs(longitude + turnDegrees - reach.middleDegrees) <= reach.degrees);
}

function shifted(line: ChartLine, turnDegrees: number): ChartLine {
  return turnDegrees === 0 ? line : line.map(([latitude, longitude]): ChartPoint => [latitude, longitude + turnDegrees]);
}
