import { useEffect, useState } from "react";
import type { Draft } from "#lib/contracts/hand-readings/draft.ts";
import { isDistanceUnit, type DistanceUnit } from "#lib/presentation/distances.ts";

/** The unit of distances. It stands in the address with the station and the event, so that a link leads to the same. */
export function useReadingView(draft: Draft): [DistanceUnit, (unit: DistanceUnit) => void] {
  const [unit, setUnit] = useState<DistanceUnit>(() => {
    const given = new URLSearchParams(globalThis.location.search).get("unit");
    return isDistanceUnit(given) ? given : "km";
  });
  const station = draft.station.way === "stored" ? draft.station.id : "";
  const event = draft.keep.way === "event" ? draft.keep.event : "";
  useEffect(() => {
    const { pathname, search, hash } = globalThis.location;
    const query = new URLSearchParams();
    if (station !== "") query.set("station", station);
    if (event !== "") query.set("event", event);
    if (unit !== "km") query.set("unit", unit);
    const wanted = query.size === 0 ? "" : `?${query.toString()}`;
    if (wanted !== search) globalThis.history.replaceState(null, "", pathname + wanted + hash);
  }, [station, event, unit]);
  return [unit, setUnit];
}
