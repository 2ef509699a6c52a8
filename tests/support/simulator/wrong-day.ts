import { drawNetwork } from "./draw-network.ts";
import { drawOrigin, matchedReadings, type DrawnEvent } from "./matched-storm.ts";
import { drawModerateStorm } from "./physical-storm.ts";
import { physicalReadings } from "./physical-readings.ts";
import type { RandomStream } from "./random.ts";
import { observationsOf, withClockOffset, type NetworkStation, type SimulatedEvent } from "./simulated-event.ts";
import type { StationReading } from "#lib/core/arrival/observations.ts";

/** A station whose log is a whole day out, in a storm that follows the stated spread or is made of its waves. */
export function drawWrongDayEvent(choice: DrawnEvent & { readonly from: "stated-spread" | "waves" }): SimulatedEvent {
  const { random } = choice;
  const { stations, storm } = drawNetwork(choice);
  const origin = drawOrigin(random);
  const made = choice.from === "waves" ? wavesOf(stations, drawModerateStorm({ centre: storm, originEpochSeconds: origin, random }), random) : null;
  const readings = made?.readings ?? matchedReadings({ stations, position: storm, originEpochSeconds: origin, random });
  const wrong = stations[random.whole(0, stations.length - 1)];
  if (!wrong) throw new Error("A network without stations has no wrong clock.");
  const clockOffsetSeconds = random.uniform() < 0.5 ? -86_400 : 86_400;
  return {
    observations: observationsOf(stations, withClockOffset(readings, wrong.id, clockOffsetSeconds)),
    truth: made?.truth ?? { position: storm, originEpochSeconds: origin },
    wrongStationId: wrong.id,
    clockOffsetSeconds,
  };
}

type Made = Pick<SimulatedEvent, "truth"> & { readonly readings: readonly StationReading[] };

function wavesOf(stations: readonly NetworkStation[], storm: ReturnType<typeof drawModerateStorm>, random: RandomStream): Made {
  const readings = stations.flatMap((station) =>
    physicalReadings({ storm, station, random, way: { kind: "ridge", binWidthHz: 0.005, frequency: "energy-mean" } }),
  );
  return { readings, truth: storm.truth };
}
