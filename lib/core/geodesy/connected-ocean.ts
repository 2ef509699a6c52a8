/** Neighbouring cells of water in one row, from the first column to the last. */
export interface WaterRun {
  readonly row: number;
  readonly first: number;
  readonly last: number;
}

/**
 * The runs of water that hang together with the cell at `seed`, over sides and corners of cells and over the edge
 * between the last column and the first. `water[row]` lists a row's runs with rising columns. Empty where the seed is
 * no water.
 */
export function connectedOcean(grid: {
  water: readonly (readonly WaterRun[])[];
  columns: number;
  seed: { row: number; column: number };
}): WaterRun[] {
  const { water, columns, seed } = grid;
  const start = water[seed.row]?.find((run) => run.first <= seed.column && seed.column <= run.last);
  const reached = new Set<WaterRun>(start === undefined ? [] : [start]);
  // a set hands out what is added while it is walked, so this ends when nothing new was reached
  for (const run of reached) {
    for (const row of [run.row - 1, run.row, run.row + 1]) {
      const others = water[row] ?? [];
      for (const other of others) {
        if (other.first > run.last + 1) break;
        if (other.last >= run.first - 1) reached.add(other);
      }
      const westmost = others[0];
      const eastmost = others.at(-1);
      if (run.first === 0 && eastmost?.last === columns - 1) reached.add(eastmost);
      if (run.last === columns - 1 && westmost?.first === 0) reached.add(westmost);
    }
  }
  return [...reached];
}
