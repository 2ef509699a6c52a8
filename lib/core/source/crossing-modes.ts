import { geodesicInverse } from "../geodesy/geodesic.ts";
import { ringCrossings } from "../geodesy/ring-crossings.ts";
import { frameAt, quickDistance } from "../geodesy/quick-inverse.ts";
import type { Position } from "../units/position.ts";
import { byProbability, type DensityOf, type Mode } from "./modes.ts";
import type { Network } from "./network.ts";
import { climbToPeak } from "./peak.ts";
import type { Posterior, WeighedCell } from "./search.ts";

/** Climbs that end nearer to each other than this have found one optimum. */
const ONE_PEAK_METRES = 10_000;

/**
 * The two modes of a pair of stations whose rings cross: an optimum near each crossing, with the cells nearer to it
 * than to the other. Null for any other network, and where both crossings lead to one optimum.
 */
export function crossingModes(network: Network, { cells, plan }: Posterior, densityOf: DensityOf): Mode[] | null {
  const [first, second] = network.arrivals;
  if (!first || !second || network.size !== 2) return null;
  const met = ringCrossings({
    first: { centre: first.position, radiusMetres: first.estimate.distanceMetres },
    second: { centre: second.position, radiusMetres: second.estimate.distanceMetres },
  });
  if (met.kind !== "cross") return null;
  const peaks = met.points.flatMap((point) => climbToPeak(network, point, plan)?.position ?? []);
  const [one, other] = peaks;
  if (!one || !other || geodesicInverse({ from: one, to: other }).distanceMetres < ONE_PEAK_METRES) return null;
  return byProbability(split(cells, one, other, densityOf), densityOf);
}

/** Each cell goes to the nearer optimum. */
function split(cells: readonly WeighedCell[], one: Position, other: Position, densityOf: DensityOf): Omit<Mode, "probability">[] {
  const [near, far] = [frameAt(one), frameAt(other)];
  const isNear = (cell: WeighedCell): boolean => {
    const frame = frameAt(cell.centre);
    return quickDistance(frame, near) <= quickDistance(frame, far);
  };
  const groups = [
    { start: one, cells: cells.filter(isNear) },
    { start: other, cells: cells.filter((cell) => !isNear(cell)) },
  ];
  return groups
    .filter((group) => group.cells.length > 0)
    .map((group) => ({ ...group, summit: group.cells.reduce((best, cell) => (densityOf(cell) > densityOf(best) ? cell : best)) }));
}
