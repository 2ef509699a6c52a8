import type { ShelfLeg } from "#lib/core/arrival/observations.ts";
import { readText } from "./cells.ts";
import type { CellPlace } from "./cells.ts";

const WANTED = "legs seaward from the gauge as length_km:depth_m, separated by spaces, such as 12:40 35:90";
const LEG = /^(\d+(?:\.\d+)?):(\d+(?:\.\d+)?)$/;

/** The legs of the way over the shelf; none where the cell is empty. */
export function readShelf(place: CellPlace): readonly ShelfLeg[] {
  const text = readText(place, WANTED);
  if (text === null) return [];
  const legs = text.split(/\s+/).map(readLeg);
  const good = legs.filter((leg) => leg !== null);
  if (good.length === legs.length) return good;
  place.problems.add({ code: "not-a-shelf", row: place.row.row, column: place.column, found: text, wanted: WANTED });
  return [];
}

function readLeg(text: string): ShelfLeg | null {
  const [, length = "", depth = ""] = LEG.exec(text) ?? [];
  // The point is moved in the text: a product with 1000 would miss the length by its last binary digit now and then.
  const leg = { lengthMetres: Number(`${length}e3`), depthMetres: Number(depth) };
  return leg.lengthMetres > 0 && leg.depthMetres > 0 && Number.isFinite(leg.lengthMetres + leg.depthMetres) ? leg : null;
}
