import { geodesicInverse } from "../geodesy/geodesic.ts";
import { isOcean, type LandMask } from "../geodesy/land-mask.ts";
import type { Position } from "../units/position.ts";
import { modesOf, type DensityOf, type Mode } from "./modes.ts";
import { crossingModes } from "./crossing-modes.ts";
import { climbToPeak, type Peak } from "./peak.ts";
import { heldAt, type Posterior, type SearchInput, type WeighedCell } from "./search.ts";
import { shareInSight } from "./site.ts";

/** A mode that holds less than this is not a possible source. */
const LEAST_PROBABILITY = 0.01;
/** A best point on land still stands where it lies within this chi-square of two of the best point in water. */
const SAME_PEAK_CHI_SQUARE = 9.21;
/** Free maxima nearer than this to a possible source are that source. */
const SAME_PLACE_METRES = 400_000;

export interface PlacedMode {
  readonly mode: Mode;
  /** The free peak that the mode belongs to, or null where land, sight or exposure cut the mode off from its peak. */
  readonly peak: Peak | null;
  readonly position: Position;
  readonly originSeconds: number;
  readonly onLand: boolean;
  readonly bestInWater: Position | null;
}

/** The possible sources, most probable first, each finished on exact geodesics. */
export function placePossibleSources(input: SearchInput, posterior: Posterior): PlacedMode[] {
  return separateModes(input, posterior, (cell) => cell.logHeld).map((mode) => placeMode(input, posterior, mode));
}

/** Two rings that cross do so at two points, each an exact optimum however shallow the saddle between them. */
function separateModes(input: SearchInput, posterior: Posterior, densityOf: DensityOf): Mode[] {
  const modes = crossingModes(input.network, posterior, densityOf) ?? modesOf(posterior, densityOf);
  return modes.filter((mode) => mode.probability >= LEAST_PROBABILITY);
}

function placeMode({ network, land }: SearchInput, { plan }: Posterior, mode: Mode): PlacedMode {
  const summit = mode.summit;
  const peak = climbToPeak(network, mode.start, plan);
  const cutOff: PlacedMode = {
    mode,
    peak: null,
    position: summit.centre,
    originSeconds: summit.originMean,
    onLand: land !== null && !isOcean(land, summit.centre),
    bestInWater: null,
  };
  if (!peak || chiSquareApart(peak, summit.centre) > SAME_PEAK_CHI_SQUARE) return cutOff;
  const found = { ...cutOff, peak, position: peak.position, originSeconds: peak.originSeconds, onLand: false };
  if (land && !isOcean(land, peak.position)) return { ...found, onLand: true, bestInWater: bestInWater(mode, land) };
  return heldAt(peak, land) >= summit.logHeld - 0.5 ? found : cutOff;
}

function bestInWater(mode: Mode, land: LandMask): Position | null {
  const wet = mode.cells.filter((cell) => isOcean(land, cell.centre));
  return wet.reduce<WeighedCell | null>((best, cell) => (best && best.logHeld >= cell.logHeld ? best : cell), null)?.centre ?? null;
}

/** How far a point lies from a peak, in units of the peak's own covariance. */
function chiSquareApart(peak: Peak, position: Position): number {
  const apart = geodesicInverse({ from: peak.position, to: position });
  const heading = (apart.departsTowardDegrees * Math.PI) / 180;
  const [east, north] = [apart.distanceMetres * Math.sin(heading), apart.distanceMetres * Math.cos(heading)];
  const { eastEast, eastNorth, northNorth } = peak.information;
  return eastEast * east ** 2 + 2 * eastNorth * east * north + northNorth * north ** 2;
}

/** Where the rings alone would allow a source and land, sight or exposure does not, with what excludes it. */
export function whatIsRuledOut(input: SearchInput, posterior: Posterior, placed: readonly PlacedMode[]): { position: Position; reason: string }[] {
  const free = separateModes(input, posterior, (cell) => cell.logFree);
  return free.flatMap((mode) => {
    const position = climbToPeak(input.network, mode.start, posterior.plan)?.position ?? mode.start;
    const isKept = placed.some((source) => isSame(source, mode, position));
    const reason = isKept ? null : reasonAgainst(input, position);
    return reason === null ? [] : [{ position, reason }];
  });
}

function isSame(source: PlacedMode, mode: Mode, position: Position): boolean {
  if (source.mode.cells.some((cell) => cell.cell === mode.summit.cell)) return true;
  return geodesicInverse({ from: source.position, to: position }).distanceMetres < SAME_PLACE_METRES;
}

function reasonAgainst({ network, land }: SearchInput, position: Position): string | null {
  const onLand = land !== null && !isOcean(land, position);
  const blocked: string[] = [];
  const turnedAway: string[] = [];
  for (const arrival of network.arrivals) {
    const way = geodesicInverse({ from: arrival.position, to: position });
    const share = shareInSight(arrival, way.departsTowardDegrees, way.distanceMetres);
    if (share.sight < 0.5) blocked.push(arrival.id);
    if (share.exposure < 0.5) turnedAway.push(arrival.id);
  }
  const reasons = [
    ...(onLand ? ["it lies on land"] : []),
    ...(blocked.length > 0 ? [`land lies between it and ${listed(blocked)}`] : []),
    ...(turnedAway.length > 0 ? [`it lies outside the bearings that ${listed(turnedAway)} ${turnedAway.length > 1 ? "are" : "is"} open to`] : []),
  ];
  return reasons.length > 0 ? reasons.join("; ") : null;
}

function listed(ids: readonly string[]): string {
  return ids.length < 2 ? ids.join("") : `${ids.slice(0, -1).join(", ")} and ${ids.at(-1) ?? ""}`;
}
