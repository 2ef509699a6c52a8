import type { Topology } from "topojson-specification";
import type { Position } from "../units/position.ts";
import { rowCrossings } from "./coast-rows.ts";
import { connectedOcean, type WaterRun } from "./connected-ocean.ts";
import { headingVector, sphericalDirect, sphericalFrame } from "./spherical-frame.ts";
import { MEAN_RADIUS_METRES } from "./earth.ts";

const CELLS_PER_DEGREE = 10;
const MASK_ROWS = 180 * CELLS_PER_DEGREE;
const MASK_COLUMNS = 360 * CELLS_PER_DEGREE;
const WORDS_PER_ROW = Math.ceil(MASK_COLUMNS / 32);

/** Which cells of 0.1 degree hold ocean at their centre: rows from the south, columns from 180 W, a bit each. */
export interface LandMask {
  readonly oceanBits: Uint32Array;
}

/** In the middle of the Pacific, south of Hawaii: what hangs together with this water is the ocean. */
const OPEN_PACIFIC: Position = { latitudeDegrees: 0, longitudeDegrees: -160 };

/**
 * The ocean as a bitmap, from land polygons (`topology.objects.land`, in degrees). Ocean is the water that hangs
 * together with the Pacific, corners included; the Caspian and the lakes are land. Straits narrower than a cell may be closed and islands smaller than one may be lost: a coast is right to about
 * 0.1 degree, 11 km. [source: natural-earth]
 *
 * @throws Error where the topology holds no polygons under that name.
 */
export function buildLandMask(topology: Topology): LandMask {
  const oceanBits = new Uint32Array(MASK_ROWS * WORDS_PER_ROW);
  const rows = rowCrossings({ topology, rows: MASK_ROWS, rowsPerDegree: CELLS_PER_DEGREE });
  const water = rows.map(waterRuns);
  const seed = { row: maskRow(OPEN_PACIFIC.latitudeDegrees), column: maskColumn(OPEN_PACIFIC.longitudeDegrees) };
  for (const run of connectedOcean({ water, columns: MASK_COLUMNS, seed })) setRun(oceanBits, run);
  return { oceanBits };
}

/** Whether the cell that holds the position is ocean. */
export function isOcean(mask: LandMask, { latitudeDegrees, longitudeDegrees }: Position): boolean {
  return oceanAt(mask, maskRow(latitudeDegrees), maskColumn(longitudeDegrees));
}

/** Whether a cell is ocean; for loops that know their rows and columns. */
export function oceanAt({ oceanBits }: LandMask, row: number, column: number): boolean {
  return (((oceanBits[row * WORDS_PER_ROW + (column >> 5)] ?? 0) >>> (column & 31)) & 1) === 1;
}

/** Rings of sample points over a disc, each point standing for an equal area: 1 + 6 + 12, at the root of the mid-area. */
const DISC_SAMPLES: readonly { readonly fraction: number; readonly points: number }[] = [
  { fraction: 0, points: 1 },
  { fraction: Math.sqrt(4 / 19), points: 6 },
  { fraction: Math.sqrt(13 / 19), points: 12 },
];

/** Fraction of a disc's area that is ocean, from 19 points of equal area: steps of a nineteenth. */
export function oceanFraction(disc: { mask: LandMask; position: Position; radiusMetres: number }): number {
  const frame = sphericalFrame(disc.position);
  let wet = 0;
  let all = 0;
  for (const { fraction, points } of DISC_SAMPLES) {
    const arcRadians = (fraction * disc.radiusMetres) / MEAN_RADIUS_METRES;
    for (let point = 0; point < points; point += 1) {
      const heading = headingVector(frame, (360 * point) / points);
      all += 1;
      if (isOcean(disc.mask, sphericalDirect(frame, heading, arcRadians))) wet += 1;
    }
  }
  return wet / all;
}

export function maskRow(latitudeDegrees: number): number {
  return Math.min(MASK_ROWS - 1, Math.max(0, Math.floor((latitudeDegrees + 90) * CELLS_PER_DEGREE)));
}

export function maskColumn(longitudeDegrees: number): number {
  const column = Math.floor((longitudeDegrees + 180) * CELLS_PER_DEGREE) % MASK_COLUMNS;
  return column < 0 ? column + MASK_COLUMNS : column;
}

/** Runs of columns whose centres lie outside the polygons: between every second pair of crossings. */
function waterRuns(crossings: Float64Array, row: number): WaterRun[] {
  const runs: WaterRun[] = [];
  let first = 0;
  for (let i = 0; i <= crossings.length; i += 2) {
    const landFrom = i < crossings.length ? firstColumnEastOf(crossings[i] ?? NaN) : MASK_COLUMNS;
    if (landFrom > first) runs.push({ row, first, last: landFrom - 1 });
    first = Math.max(first, firstColumnEastOf(crossings[i + 1] ?? 180));
  }
  return runs;
}

/** The first column whose centre lies on or east of a longitude. */
function firstColumnEastOf(longitudeDegrees: number): number {
  return Math.min(MASK_COLUMNS, Math.max(0, Math.ceil((longitudeDegrees + 180) * CELLS_PER_DEGREE - 0.5)));
}

function setRun(bits: Uint32Array, { row, first, last }: WaterRun): void {
  const base = row * WORDS_PER_ROW;
  for (let word = first >> 5; word <= last >> 5; word += 1) {
    const from = Math.max(first - word * 32, 0);
    const to = Math.min(last - word * 32, 31);
    bits[base + word] = (bits[base + word] ?? 0) | ((0xffffffff >>> (31 - to)) & (0xffffffff << from));
  }
}
