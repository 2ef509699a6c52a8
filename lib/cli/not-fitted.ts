import { InputError } from "#lib/core/failures/input-error.ts";
import type { FitJson } from "#lib/contracts/fit-json.ts";

/** No station could be fitted: why not, of each. */
export function noStationFitted(stations: FitJson["stations"]): InputError {
  const reasons = stations.map(({ id, error = "", errorCode = "" }) => ({ code: errorCode, path: id, message: `Station ${id}: ${error}` }));
  return new InputError([{ code: "no-station-fitted", path: "stations", message: "No station could be fitted." }, ...reasons]);
}
