import type { WeighedCell } from "./search.ts";

/** Log of a cell's share of the probability, up to a constant all cells have in common. */
export function logMass(cell: WeighedCell): number {
  return cell.logHeld + Math.log(cell.areaSquareMetres);
}

/** Log of the probability, same constant, that all cells hold together. */
export function logTotal(logs: readonly number[]): number {
  let top = -Infinity;
  for (const log of logs) if (log > top) top = log;
  if (top === -Infinity) return -Infinity;
  return top + Math.log(logs.reduce((sum, log) => sum + Math.exp(log - top), 0));
}

/** The densest cells that together hold at least `probability` (0..1) of what all hold, densest first. */
export function cellsHolding(cells: readonly WeighedCell[], probability: number): WeighedCell[] {
  const total = logTotal(cells.map(logMass));
  const densest = [...cells].sort((a, b) => b.logHeld - a.logHeld || (a.cell < b.cell ? -1 : 1));
  const held: WeighedCell[] = [];
  let sum = 0;
  for (const cell of densest) {
    if (sum >= probability) break;
    held.push(cell);
    sum += Math.exp(logMass(cell) - total);
  }
  return held;
}
