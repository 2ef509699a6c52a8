import { drawNetwork, isWithinReach } from "./draw-network.ts";
import { roughMetres } from "./ellipsoid.ts";
import { drawOrigin, matchedReadings, type DrawnEvent } from "./matched-storm.ts";
import { observationsOf, type SimulatedEvent } from "./simulated-event.ts";
import { seaPoint } from "./world.ts";
import type { Position } from "#lib/core/units/position.ts";

const APART_METRES = 2_000_000;

/** As a matched storm, but one station follows another storm: at least 2000 km and 1 to 5 days away. */
export function drawWrongStationEvent(choice: DrawnEvent): SimulatedEvent {
  const { random } = choice;
  const { stations, storm } = drawNetwork(choice);
  const originEpochSeconds = drawOrigin(random);
  const wrong = stations[random.whole(0, stations.length - 1)];
  if (!wrong) throw new Error("A network without stations has no wrong one.");
  const other = drawOtherStorm(choice, wrong.position, storm);
  const daysApart = (random.uniform() < 0.5 ? -1 : 1) * random.between(1, 5);
  const readings = [
    ...matchedReadings({ stations: stations.filter((station) => station !== wrong), position: storm, originEpochSeconds, random }),
    ...matchedReadings({ stations: [wrong], position: other, originEpochSeconds: originEpochSeconds + daysApart * 86_400, random }),
  ];
  return {
    observations: observationsOf(stations, readings),
    truth: { position: storm, originEpochSeconds },
    wrongStationId: wrong.id,
    clockOffsetSeconds: null,
  };
}

function drawOtherStorm({ world, random, inSight }: DrawnEvent, station: Position, storm: Position): Position {
  for (;;) {
    const other = seaPoint(world, random);
    if (!isWithinReach(station, other) || (inSight && !world.isOpen({ station, storm: other }))) continue;
    if (roughMetres(storm, other) > APART_METRES) return other;
  }
}
