import { fitEachStation } from "#lib/application/fit-stations.ts";
import { wrongCall } from "../call.ts";
import { readEventInput } from "../event-input.ts";
import { noStationFitted } from "../not-fitted.ts";
import { fitText } from "../text/fit-text.ts";
import type { Verb } from "../verb.ts";

export const fit: Verb = {
  summary: "the dispersion line of each station: how far away and when the storm was",
  options: ["readings", "stations", "settings"],
  help: `offing fit --readings R.csv [--stations S.csv] [--settings S.json] [--json]

Fits each station's readings alone: distance and time of the storm, with their errors.

  --readings R.csv   station,time and period_s or frequency_hz; optionally period_sigma_s or
                     frequency_sigma_hz, time_sigma_s, kind (ridge or timed), bearing_deg, bearing_sigma_deg
  --stations S.csv   id,name,latitude,longitude and optionally sensor, shelf and more: for sensors on the
                     ground and for the shelf's correction
  --settings S.json  settings that replace the defaults
  --json             print the answer as JSON
  --help             print this`,
  run({ call, folder, host }) {
    if (!call.named.has("readings")) throw wrongCall("fit", "found no --readings; wanted a file of readings");
    const { observations, settings, notes } = readEventInput({ call, folder });
    const answer = fitEachStation({ observations, settings, notes, host });
    if (answer.stations.every(({ error }) => error !== undefined)) throw noStationFitted(answer.stations);
    return { json: answer, text: fitText(answer), messages: answer.warnings.map(({ message }) => message) };
  },
};
