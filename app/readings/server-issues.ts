import type { PlacedField } from "#lib/contracts/hand-readings/placed-station.ts";
import type { RowField } from "#lib/contracts/hand-readings/hand-row.ts";
import type { Issue } from "../_components/ask-server.ts";

/** Where on the form a message of the server belongs. */
export interface PlacedIssues {
  readonly rows: readonly { readonly key: number; readonly field: RowField; readonly message: string }[];
  readonly placed: readonly { readonly field: PlacedField; readonly message: string }[];
  readonly station: string | null;
  readonly title: string | null;
  readonly event: string | null;
  readonly note: string | null;
  /** Those that belong to no field. */
  readonly others: readonly string[];
}

const ROW_FIELDS: Readonly<Record<string, RowField | undefined>> = { time: "time", periodSeconds: "period", frequencyHz: "waves", frequencySigmaHz: "seconds" };
const PLACED_FIELDS: Readonly<Record<string, PlacedField | undefined>> = {
  id: "id",
  "deployments[0].name": "name",
  "deployments[0].latitudeDegrees": "latitude",
  "deployments[0].longitudeDegrees": "longitude",
  "deployments[0].timeZone": "timeZone",
};

/** `keys` are those of the rows that were sent, in their order. */
export function placeIssues(issues: readonly Issue[], keys: readonly number[]): PlacedIssues {
  const rows: { key: number; field: RowField; message: string }[] = [];
  const placed: { field: PlacedField; message: string }[] = [];
  const single = new Map<string, string>();
  const others: string[] = [];
  for (const { path, message } of issues) {
    const [, index = "", name = ""] = /^readings\[(\d+)\]\.(\w+)$/.exec(path) ?? [];
    const [key, field, own] = [keys[Number(index)], ROW_FIELDS[name], PLACED_FIELDS[path]];
    if (index !== "" && key !== undefined && field !== undefined) rows.push({ key, field, message });
    else if (own !== undefined) placed.push({ field: own, message });
    else if (["station", "title", "event", "note"].includes(path)) single.set(path, message);
    else others.push(message);
  }
  return { rows, placed, others, station: single.get("station") ?? null, title: single.get("title") ?? null, event: single.get("event") ?? null, note: single.get("note") ?? null };
}
