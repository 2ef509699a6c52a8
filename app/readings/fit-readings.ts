import { readingsToSave, type NewReading } from "#lib/contracts/api/readings.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import type { ClockCorrection, GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import { gatheringNotes } from "#lib/core/arrival/gathering-notes.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { fitStations, type FittedStation } from "#lib/core/source/fit-stations.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";

/** Where somebody times waves, with all that is known of the place. */
export interface StationAtHand {
  readonly id: string;
  readonly deployments: readonly Deployment[];
  readonly clockCorrections: readonly ClockCorrection[];
}

export interface NumberedReading {
  /** As the form counts its rows. */
  readonly number: number;
  readonly reading: NewReading;
}

export interface Findings {
  /** Null where no reading can be used. */
  readonly fitted: FittedStation | null;
  readonly notes: readonly string[];
}

/** What the readings say, worked out just as it would be once they are brought in. */
export function fitReadings(station: StationAtHand, readings: readonly NumberedReading[], settings: EstimationSettings): Findings {
  const saved = readingsToSave(readings.map(({ reading }) => reading));
  const gathered: GatheredObservations = {
    deployments: station.deployments,
    readings: saved.map(({ reading, quality }, i) => ({
      ...{ id: i + 1, arrivalId: 1, stationId: station.id, quality },
      reading: { ...reading, row: readings[i]?.number ?? i + 1 },
    })),
    estimates: [],
    clockCorrections: station.clockCorrections,
  };
  const [fitted = null] = fitStations({ observations: chosenObservations(gathered, NO_CHOICES), settings });
  return { fitted, notes: [...gatheringNotes(gathered, NO_CHOICES).map(({ message }) => withoutId(message, station.id)), ...placeNotes(fitted)] };
}

/** The station is named above: its id before each sentence would only be in the way. */
function withoutId(message: string, id: string): string {
  const rest = message.startsWith(`${id}: `) ? message.slice(id.length + 2) : message;
  return rest.charAt(0).toUpperCase() + rest.slice(1);
}

function placeNotes(fitted: FittedStation | null): string[] {
  if (fitted === null || fitted.readings.length === 0) return [];
  const { sensor, shelf } = fitted.deployment;
  return [
    ...(sensor === "ground" ? ["This station feels the ground, so its frequencies are taken as doubled and were halved. For waves seen by eye, place a station of its own."] : []),
    ...(shelf.length === 0 ? ["No shelf profile is known here, so no delay over the shelf was taken off."] : []),
  ];
}
