import type { Position } from "../units/position.ts";
import type { NeighboursOf } from "./neighbours.ts";
import { logTotal } from "./regions.ts";
import type { WeighedCell } from "./search.ts";

/** Two maxima are separate possible sources where the saddle between them lies e^2 under the lower one. */
const SADDLE_DEPTH = 2;

/** Log density of a cell, one of those that it carries. */
export type DensityOf = (cell: WeighedCell) => number;

/** Cells, and which of them touch. */
export interface Landscape {
  readonly cells: readonly WeighedCell[];
  readonly neighboursOf: NeighboursOf;
}

export interface Mode {
  /** Where a climb to the mode's optimum starts. */
  readonly start: Position;
  readonly summit: WeighedCell;
  readonly cells: readonly WeighedCell[];
  /** Share (0..1) of the probability of all cells. */
  readonly probability: number;
}

/**
 * The separate maxima of a density over the cells, most probable first: cells are taken densest first and join the
 * maximum they touch; where two maxima meet, the lower one is merged unless the meeting lies `SADDLE_DEPTH` below it
 * (topological persistence). [source: edelsbrunner-2002]
 */
export function modesOf({ cells, neighboursOf }: Landscape, densityOf: DensityOf): Mode[] {
  const densest = [...cells].sort((a, b) => densityOf(b) - densityOf(a) || (a.cell < b.cell ? -1 : 1));
  const owner = new Map<WeighedCell, WeighedCell>();
  const mergedInto = new Map<WeighedCell, WeighedCell>();
  for (const cell of densest) {
    const owners = neighboursOf(cell).flatMap((neighbour) => owner.get(neighbour) ?? []);
    const touching = [...new Set(owners.map((summit) => rootOf(summit, mergedInto)))].sort((a, b) => densityOf(b) - densityOf(a));
    const [highest, ...others] = touching;
    owner.set(cell, highest ?? cell);
    if (!highest) continue;
    for (const lower of others) {
      if (densityOf(lower) - densityOf(cell) < SADDLE_DEPTH) mergedInto.set(lower, highest);
    }
  }
  return gather(densest, owner, mergedInto, densityOf);
}

function rootOf(summit: WeighedCell, mergedInto: ReadonlyMap<WeighedCell, WeighedCell>): WeighedCell {
  let root = summit;
  for (let next = mergedInto.get(root); next; next = mergedInto.get(root)) root = next;
  return root;
}

function gather(
  cells: readonly WeighedCell[],
  owner: ReadonlyMap<WeighedCell, WeighedCell>,
  mergedInto: ReadonlyMap<WeighedCell, WeighedCell>,
  densityOf: DensityOf,
): Mode[] {
  const groups = new Map<WeighedCell, WeighedCell[]>();
  for (const cell of cells) {
    const summit = rootOf(owner.get(cell) ?? cell, mergedInto);
    const group = groups.get(summit);
    if (group) group.push(cell);
    else groups.set(summit, [cell]);
  }
  return byProbability([...groups].map(([summit, members]) => ({ start: summit.centre, summit, cells: members })), densityOf);
}

/** Groups of cells as modes, each with its share, most probable first. */
export function byProbability(groups: readonly Omit<Mode, "probability">[], densityOf: DensityOf): Mode[] {
  const logs = groups.map(({ cells }) => logTotal(cells.map((cell) => densityOf(cell) + Math.log(cell.areaSquareMetres))));
  const total = logTotal(logs);
  return groups
    .map((group, i) => ({ ...group, probability: Math.exp((logs[i] ?? NaN) - total) }))
    .sort((a, b) => b.probability - a.probability || (a.summit.cell < b.summit.cell ? -1 : 1));
}
