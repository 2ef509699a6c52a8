import { stationJson, type StationJson } from "#lib/contracts/api/stations.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { RunningProgram } from "./running-program.ts";

/** A station as `readStation` gives it. @throws Refusal `not-found` */
export async function stationReply({ stations }: RunningProgram, id: string): Promise<StationJson> {
  const station = await stations.loadStation(id);
  if (station === null) throw new Refusal("not-found", `No station "${id}" is stored.`);
  return stationJson(station);
}
