import { isDistanceUnit, type DistanceUnit } from "#lib/presentation/distances.ts";

/** What the reader has chosen to see. It stands in the address, so that a link shows a colleague the same. */
export interface EventView {
  readonly without: readonly string[];
  readonly focus: string | null;
  readonly unit: DistanceUnit;
  readonly showsOverlap: boolean;
  readonly showsSight: boolean;
}

/** Reads a view from an address's query; what it does not know it leaves at its default. */
export function viewFromQuery(query: URLSearchParams, knownIds: readonly string[]): EventView {
  const known = (id: string | null): id is string => id !== null && knownIds.includes(id);
  const focus = query.get("focus");
  const unit = query.get("unit");
  return {
    without: [...new Set(query.getAll("without"))].filter(known),
    focus: known(focus) ? focus : null,
    unit: isDistanceUnit(unit) ? unit : "km",
    showsOverlap: query.get("overlap") === "yes",
    showsSight: query.get("sight") !== "no",
  };
}

/** The same view as a query, empty for the default one. */
export function queryFromView(view: EventView): string {
  const query = new URLSearchParams();
  for (const id of view.without) query.append("without", id);
  if (view.focus !== null) query.set("focus", view.focus);
  if (view.unit !== "km") query.set("unit", view.unit);
  if (view.showsOverlap) query.set("overlap", "yes");
  if (!view.showsSight) query.set("sight", "no");
  const text = query.toString();
  return text === "" ? "" : `?${text}`;
}
