import type { Page } from "playwright-core";
import type { Position } from "#lib/core/units/position.ts";

/** Points along one drawn stroke, from where the pen goes down to where it is lifted. */
export type Stroke = readonly Position[];

/** What stands on an event's chart, read off the picture itself: pixels turned back into degrees. */
export interface DrawnChart {
  readonly degreesPerPixel: number;
  /** The strokes of every outlined shape on one of the chart's layers, one array a shape. */
  readonly strokes: (layer: string) => Promise<Stroke[][]>;
  /** The longest single stroke of the pen on a layer, in pixels. */
  readonly longestSide: (layer: string) => Promise<number>;
  /** For each of a layer's filled shapes, whether it holds a position. */
  readonly holding: (layer: string, position: Position) => Promise<boolean[]>;
  /** Middle of each round mark on a layer. */
  readonly marks: (layer: string) => Promise<Position[]>;
}

interface Pixel {
  readonly x: number;
  readonly y: number;
}

/**
 * Finds the chart's scale from two stations whose numbers stand on it (`known`, far apart), by the spherical Mercator
 * projection: x runs with longitude, y with ln tan(45 degrees + latitude / 2). Snyder 1987, Map projections: a working
 * manual, equations 7-1 and 7-2, from memory.
 */
export async function readChart(page: Page, known: readonly { name: string; position: Position }[]): Promise<DrawnChart> {
  const [first, second] = await Promise.all(known.map(async ({ name, position }) => ({ position, pixel: await middle(page, name) })));
  if (first === undefined || second === undefined) throw new Error("Two stations are needed to find the scale.");
  const pixelsPerDegree = (second.pixel.x - first.pixel.x) / (second.position.longitudeDegrees - first.position.longitudeDegrees);

  const toPosition = ({ x, y }: Pixel): Position => ({
    longitudeDegrees: first.position.longitudeDegrees + (x - first.pixel.x) / pixelsPerDegree,
    latitudeDegrees: latitudeOf(mercator(first.position.latitudeDegrees) - (y - first.pixel.y) / pixelsPerDegree),
  });
  const toPixel = (position: Position): Pixel => ({
    x: first.pixel.x + (position.longitudeDegrees - first.position.longitudeDegrees) * pixelsPerDegree,
    y: first.pixel.y - (mercator(position.latitudeDegrees) - mercator(first.position.latitudeDegrees)) * pixelsPerDegree,
  });
  const pixelStrokes = (layer: string): Promise<Pixel[][][]> => page.evaluate(readStrokes, layer);
  return {
    degreesPerPixel: 1 / pixelsPerDegree,
    strokes: async (layer) => (await pixelStrokes(layer)).map((shape) => shape.map((stroke) => stroke.map(toPosition))),
    longestSide: async (layer) => {
      const sides = (await pixelStrokes(layer)).flat().flatMap((stroke) => stroke.slice(1).map(({ x, y }, i) => Math.hypot(x - (stroke[i]?.x ?? x), y - (stroke[i]?.y ?? y))));
      return Math.max(...sides);
    },
    holding: (layer, position) => page.evaluate(readHolding, { layer, at: toPixel(position) }),
    marks: async (layer) => (await page.evaluate(readMarks, layer)).map(toPosition),
  };
}

function mercator(latitudeDegrees: number): number {
  return (Math.log(Math.tan(Math.PI / 4 + (latitudeDegrees * Math.PI) / 360)) * 180) / Math.PI;
}

function latitudeOf(ordinate: number): number {
  return ((2 * Math.atan(Math.exp((ordinate * Math.PI) / 180)) - Math.PI / 2) * 180) / Math.PI;
}

async function middle(page: Page, stationName: string): Promise<Pixel> {
  const box = await page.getByRole("button", { name: new RegExp(`^Station \\d+ ${stationName}`) }).boundingBox();
  if (box === null) throw new Error(`${stationName} does not stand on the chart.`);
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

// The three below run in the page, and can use nothing from here.

function readStrokes(layer: string): { x: number; y: number }[][][] {
  const outlined = [...document.querySelectorAll<SVGPathElement>(`.leaflet-${layer}-pane path`)].filter((path) => getComputedStyle(path).stroke !== "none");
  return outlined.map((path) => {
    const toScreen = path.getScreenCTM() ?? new DOMMatrix();
    const strokes = (path.getAttribute("d") ?? "").split("M").slice(1);
    return strokes.map((stroke) =>
      [...stroke.matchAll(/(-?[\d.]+)[ ,](-?[\d.]+)/g)].map(([, x, y]) => {
        const at = new DOMPoint(Number(x), Number(y)).matrixTransform(toScreen);
        return { x: at.x, y: at.y };
      }),
    );
  });
}

function readHolding({ layer, at }: { layer: string; at: { x: number; y: number } }): boolean[] {
  const filled = [...document.querySelectorAll<SVGPathElement>(`.leaflet-${layer}-pane path`)].filter((path) => getComputedStyle(path).fill !== "none");
  return filled.map((path) => {
    const toScreen = path.getScreenCTM() ?? new DOMMatrix();
    return path.isPointInFill(new DOMPoint(at.x, at.y).matrixTransform(toScreen.inverse()));
  });
}

function readMarks(layer: string): { x: number; y: number }[] {
  return [...document.querySelectorAll(`.leaflet-${layer}-pane path`)].map((path) => {
    const { left, right, top, bottom } = path.getBoundingClientRect();
    return { x: (left + right) / 2, y: (top + bottom) / 2 };
  });
}
