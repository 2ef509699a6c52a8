import type { ChartLine, ChartPoint } from "./chart-point.ts";

/**
 * A line along hexagonal cells, eased for the eye: through the middles of its sides, where the zigzag of a straight row
 * of cells becomes a straight line, then with each corner cut once at a quarter of both sides (Chaikin 1974). It stays
 * within half a side of the line that it stands for. The ends of an open line are kept.
 */
export function smoothOpenLine(line: ChartLine): ChartLine {
  const first = line[0];
  const last = line.at(-1);
  if (first === undefined || last === undefined || line.length < 3) return line;
  const middles = [first, ...betweenNeighbours(line, [0.5]), last];
  return [first, ...betweenNeighbours(middles, [0.25, 0.75]), last];
}

/** The same for a closed line, whose last point repeats its first. */
export function smoothClosedLine(line: ChartLine): ChartLine {
  const middles = closed(betweenNeighbours(line, [0.5]));
  return closed(betweenNeighbours(middles, [0.25, 0.75]));
}

function betweenNeighbours(line: ChartLine, fractions: readonly number[]): ChartLine {
  return line.slice(1).flatMap((to, index) => {
    const from = line[index] ?? to;
    return fractions.map((fraction): ChartPoint => [
      from[0] + fraction * (to[0] - from[0]),
      from[1] + fraction * (to[1] - from[1]),
    ]);
  });
}

function closed(line: ChartLine): ChartLine {
  const [first] = line;
  return first === undefined ? [] : [...line, first];
}
