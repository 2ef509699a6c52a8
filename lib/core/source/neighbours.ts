import { gridDisk } from "h3-js";
import type { WeighedCell } from "./search.ts";

/** Those of a posterior's cells that touch one of them, itself among them. */
export type NeighboursOf = (cell: WeighedCell) => readonly WeighedCell[];

/** Finds each cell's neighbours when first asked, and remembers them. */
export function neighbourFinder(cells: readonly WeighedCell[]): NeighboursOf {
  const byName = new Map(cells.map((cell) => [cell.cell, cell]));
  const found = new Map<WeighedCell, readonly WeighedCell[]>();
  return (cell) => {
    const known = found.get(cell) ?? gridDisk(cell.cell, 1).flatMap((name) => byName.get(name) ?? []);
    found.set(cell, known);
    return known;
  };
}
