import { locateEvent } from "#lib/application/locate-event.ts";
import { stationJson } from "#lib/contracts/station-json.ts";
import { wrongCall } from "../call.ts";
import { readEventInput } from "../event-input.ts";
import { noStationFitted } from "../not-fitted.ts";
import { locateText } from "../text/locate-text.ts";
import type { Verb } from "../verb.ts";

export const locate: Verb = {
  summary: "where and when the storm was, and how sure that is",
  options: ["stations", "readings", "arrivals", "settings"],
  help: `offing locate --stations S.csv [--readings R.csv] [--arrivals A.csv] [--settings S.json] [--json]

Places the storm that made one event's swell at all stations. One call, one event.

  --stations S.csv   id,name,latitude,longitude and optionally depth_m, sensor (surface, pressure, ground),
                     faces_from_deg, faces_to_deg, record_minutes, stamp, time_zone, from, to, shelf
  --readings R.csv   station,time and period_s or frequency_hz; optionally period_sigma_s or
                     frequency_sigma_hz, time_sigma_s, kind (ridge or timed), bearing_deg, bearing_sigma_deg
  --arrivals A.csv   station,distance_km,origin_time and optionally distance_sigma_km,
                     origin_time_sigma_h, correlation: for stations that share only their estimate
  --settings S.json  settings that replace the defaults
  --json             print the answer as JSON
  --help             print this

Readings, arrivals or both are needed. Timing only, not height. Not for navigation and not a warning service:
official warnings and licensed judgement come first.`,
  run({ call, folder, host }) {
    if (!call.named.has("stations")) throw wrongCall("locate", "found no --stations; wanted a file that says where the stations are");
    if (!call.named.has("readings") && !call.named.has("arrivals")) {
      throw wrongCall("locate", "found neither --readings nor --arrivals; wanted at least one of them");
    }
    const { observations, settings, notes } = readEventInput({ call, folder });
    const { solution, answer } = locateEvent({ observations, settings, notes, host });
    if (answer === null) throw noStationFitted(solution.stations.map(stationJson));
    return { json: answer, text: locateText({ observations, solution, answer }), messages: answer.warnings.map(({ message }) => message) };
  },
};
