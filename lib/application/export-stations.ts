import { writeStationRegister } from "#lib/records/write-station-register.ts";
import type { StationStore } from "./ports.ts";

/** All stations as a file that `takeInStations` takes back, and that the command line reads. */
export async function exportStations(stations: StationStore): Promise<string> {
  return writeStationRegister(await stations.listStations());
}
