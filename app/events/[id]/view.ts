import { isDistanceUnit, type DistanceUnit } from "#lib/presentation/distances.ts";

/** Where the reader has put the chart: its middle and the map library's scale. */
export interface ChartPlace {
  readonly latitudeDegrees: number;
  readonly longitudeDegrees: number;
  readonly zoom: number;
}

/** What the reader has chosen to see. It stands in the address, so that a link shows a colleague the same. */
export interface EventView {
  readonly without: readonly string[];
  readonly focus: string | null;
  readonly unit: DistanceUnit;
  readonly showsOverlap: boolean;
  readonly showsSight: boolean;
  /** Null where the chart shows the whole event. */
  readonly place: ChartPlace | null;
}

/** What an address need not say: the event's stations, and those left out where it says nothing of them. */
export interface ViewDefaults {
  readonly knownIds: readonly string[];
  readonly without: readonly string[];
}

/** Reads a view from an address's query; what it does not know it leaves at its default. */
export function viewFromQuery(query: URLSearchParams, { knownIds, without }: ViewDefaults): EventView {
  const known = (id: string | null): id is string => id !== null && knownIds.includes(id);
  const focus = query.get("focus");
  const unit = query.get("unit");
  return {
    without: query.has("without") ? [...new Set(query.getAll("without"))].filter(known) : without,
    focus: known(focus) ? focus : null,
    unit: isDistanceUnit(unit) ? unit : "km",
    showsOverlap: query.get("overlap") === "yes",
    showsSight: query.get("sight") !== "no",
    place: placeFromText(query.get("at")),
  };
}

/** The same view as a query, empty for the default one. */
export function queryFromView(view: EventView, { without }: ViewDefaults): string {
  const query = new URLSearchParams();
  for (const id of view.without) query.append("without", id);
  if (view.without.length === 0 && without.length > 0) query.set("without", "");
  if (view.focus !== null) query.set("focus", view.focus);
  if (view.unit !== "km") query.set("unit", view.unit);
  if (view.showsOverlap) query.set("overlap", "yes");
  if (!view.showsSight) query.set("sight", "no");
  if (view.place !== null) query.set("at", placeText(view.place));
  // Commas may stand in a query as they are, and are easier read so.
  const text = query.toString().replaceAll("%2C", ",");
  return text === "" ? "" : `?${text}`;
}

/** To hundredths of a degree and of a step of scale: a pixel or two at the largest scale. */
export function placeText({ latitudeDegrees, longitudeDegrees, zoom }: ChartPlace): string {
  return [latitudeDegrees, longitudeDegrees, zoom].map((value) => String(Math.round(value * 100) / 100)).join(",");
}

const PLACE = /^(-?\d{1,2}(?:\.\d+)?),(-?\d{1,3}(?:\.\d+)?),(\d(?:\.\d+)?)$/;

function placeFromText(text: string | null): ChartPlace | null {
  const found = PLACE.exec(text ?? "");
  if (found === null) return null;
  const [, latitude, longitude, zoom] = found;
  return { latitudeDegrees: Number(latitude), longitudeDegrees: Number(longitude), zoom: Number(zoom) };
}
