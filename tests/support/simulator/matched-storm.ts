import type { StationReading } from "#lib/core/arrival/observations.ts";
import type { Position } from "#lib/core/units/position.ts";
import { travelSeconds } from "./deep-water.ts";
import { drawNetwork } from "./draw-network.ts";
import { legBetween } from "./ellipsoid.ts";
import type { RandomStream } from "./random.ts";
import { observationsOf, type NetworkStation, type SimulatedEvent } from "./simulated-event.ts";
import { drawEffects, STATED_EFFECTS, type EffectSizes } from "./storm-effects.ts";
import type { World } from "./world.ts";

/** Mid-band, about which the storm's growth or decay shifts its frequencies. */
const PIVOT_HZ = 0.075;
export const RIDGE_SIGMA_SECONDS = 1800;

export interface MatchedStorm {
  readonly stations: readonly NetworkStation[];
  readonly position: Position;
  readonly originEpochSeconds: number;
  readonly random: RandomStream;
  readonly sizes?: EffectSizes;
  readonly noiseSeconds?: number;
  /** By station; 8 to 24 where not given. */
  readonly readingsEach?: number;
}

/**
 * Ridge readings of a storm whose waves of frequency f leave toward station i at t0 + a_i + q (f - 0.075 Hz), over a
 * path of D_i (1 + k) + d_i: a and d the station's own (and partly its neighbours'), q and k the whole storm's.
 */
export function matchedReadings(storm: MatchedStorm): StationReading[] {
  const { stations, position, originEpochSeconds, random, sizes = STATED_EFFECTS, noiseSeconds = RIDGE_SIGMA_SECONDS } = storm;
  const legs = stations.map((station) => legBetween(position, station.position));
  const effects = drawEffects({ azimuthsDegrees: legs.map((leg) => leg.headsTowardDegrees), sizes, random });
  return stations.flatMap((station, i) => {
    const distanceMetres = (legs[i]?.distanceMetres ?? NaN) * (1 + effects.scaleFraction) + (effects.pathMetres[i] ?? NaN);
    const departure = originEpochSeconds + (effects.departureSeconds[i] ?? NaN);
    return drawFrequencies(random, storm.readingsEach ?? random.whole(8, 24)).map((frequencyHz) => {
      const leaves = departure + effects.tiltSecondsPerHz * (frequencyHz - PIVOT_HZ);
      const arrives = leaves + travelSeconds({ frequencyHz, distanceMetres });
      return ridgeReading({ stationId: station.id, frequencyHz, arrivalEpochSeconds: arrives + noiseSeconds * random.normal() });
    });
  });
}

export function ridgeReading(entry: { stationId: string; frequencyHz: number; arrivalEpochSeconds: number }): StationReading {
  return {
    stationId: entry.stationId,
    reading: {
      arrivalEpochSeconds: entry.arrivalEpochSeconds,
      frequencyHz: entry.frequencyHz,
      arrivalSigmaSeconds: RIDGE_SIGMA_SECONDS,
      frequencySigmaHz: 0,
      kind: "ridge",
      row: 0,
      bearing: null,
    },
  };
}

/** Evenly over the part of 0.045 to 0.085 Hz that stood out at this station. */
function drawFrequencies(random: RandomStream, count: number): number[] {
  const low = random.between(0.045, 0.053);
  const high = random.between(0.072, 0.085);
  return Array.from({ length: count }, (_, i) => low + ((high - low) * i) / (count - 1));
}

/** Some moment of the year 2021. */
export function drawOrigin(random: RandomStream): number {
  return Date.UTC(2021, 0, 1) / 1000 + Math.round(random.between(0, 365 * 86_400));
}

export interface DrawnEvent {
  readonly world: World;
  readonly random: RandomStream;
  readonly count: number;
  readonly pool?: readonly NetworkStation[];
  readonly inSight?: boolean;
}

export function drawMatchedEvent(choice: DrawnEvent): SimulatedEvent {
  const { random } = choice;
  const { stations, storm } = drawNetwork(choice);
  const originEpochSeconds = drawOrigin(random);
  return {
    observations: observationsOf(stations, matchedReadings({ stations, position: storm, originEpochSeconds, random })),
    truth: { position: storm, originEpochSeconds },
    wrongStationId: null,
    clockOffsetSeconds: null,
  };
}
