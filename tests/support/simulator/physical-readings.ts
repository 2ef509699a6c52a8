import type { StationReading } from "#lib/core/arrival/observations.ts";
import { GRAVITY, travelSeconds } from "./deep-water.ts";
import { drawNetwork } from "./draw-network.ts";
import { legBetween } from "./ellipsoid.ts";
import { drawOrigin, RIDGE_SIGMA_SECONDS, ridgeReading, type DrawnEvent } from "./matched-storm.ts";
import { drawStorm, type Emitter, type PhysicalStorm } from "./physical-storm.ts";
import type { RandomStream } from "./random.ts";
import { observationsOf, type NetworkStation, type SimulatedEvent } from "./simulated-event.ts";

/**
 * How readings are taken from the spectra at a station: the time at which each bin's energy peaks, told at the bin's
 * centre or at the mean frequency of the energy in it; or the mean frequency of the waves at fixed moments.
 */
export type ReadingWay =
  | { readonly kind: "ridge"; readonly binWidthHz: number; readonly frequency: "bin-centre" | "energy-mean"; readonly noiseSeconds?: number }
  | { readonly kind: "timed"; readonly everyHours: number; readonly noiseFraction?: number };

export interface StationView {
  readonly storm: PhysicalStorm;
  readonly station: NetworkStation;
  readonly random: RandomStream;
  readonly way: ReadingWay;
}

const LOW_HZ = 0.035;
const HIGH_HZ = 0.1;
/** Bins below this share of the ridge's highest one, and moments below this share of the fullest one, give nothing. */
const LEAST_SHARE = 0.08;
const BAND_PARTS = 6;
const SLOT_SECONDS = 1800;
/** What a sea's own variability makes one smooth over before a peak's time can be told. */
const SMOOTHING_SECONDS = 2 * 3600;

export function physicalReadings(view: StationView): StationReading[] {
  return view.way.kind === "ridge" ? ridgeReadings(view, view.way) : timedReadings(view, view.way);
}

interface Source {
  readonly distanceMetres: number;
  readonly emitter: Emitter;
}

function sourcesAt({ storm, station }: StationView): Source[] {
  return storm.emitters.map((emitter) => ({ emitter, distanceMetres: legBetween(emitter.position, station.position).distanceMetres }));
}

function strength(frequencyHz: number, peakHz: number, sigmaHz: number): number {
  return Math.exp(-0.5 * ((frequencyHz - peakHz) / sigmaHz) ** 2);
}

interface RidgeBin {
  readonly centreHz: number;
  readonly meanHz: number;
  readonly peakEpochSeconds: number;
  readonly peakEnergy: number;
}

function ridgeReadings(view: StationView, way: Extract<ReadingWay, { kind: "ridge" }>): StationReading[] {
  const sources = sourcesAt(view);
  const bins: RidgeBin[] = [];
  for (let lowHz = LOW_HZ; lowHz < HIGH_HZ; lowHz += way.binWidthHz) bins.push(ridgeBin(view, sources, lowHz, way.binWidthHz));
  const highest = Math.max(...bins.map((bin) => bin.peakEnergy));
  return bins
    .filter((bin) => bin.peakEnergy > LEAST_SHARE * highest)
    .map((bin) =>
      ridgeReading({
        stationId: view.station.id,
        frequencyHz: way.frequency === "bin-centre" ? bin.centreHz : bin.meanHz,
        arrivalEpochSeconds: bin.peakEpochSeconds + (way.noiseSeconds ?? RIDGE_SIGMA_SECONDS) * view.random.normal(),
      }),
    );
}

/** Energy of one bin against time, summed over every emitter, and where it peaks. */
function ridgeBin({ storm }: StationView, sources: readonly Source[], lowHz: number, widthHz: number): RidgeBin {
  const sigmaHz = storm.shape.spectrumSigmaHz;
  const { firstEpochSeconds, slots } = emptySlots(sources, lowHz, lowHz + widthHz);
  let total = 0;
  let moment = 0;
  for (let part = 0; part < BAND_PARTS; part++) {
    const frequencyHz = lowHz + ((part + 0.5) / BAND_PARTS) * widthHz;
    for (const { distanceMetres, emitter } of sources) {
      const energy = strength(frequencyHz, emitter.peakHz, sigmaHz);
      const slot = Math.floor((emitter.epochSeconds + travelSeconds({ frequencyHz, distanceMetres }) - firstEpochSeconds) / SLOT_SECONDS);
      slots[slot] = (slots[slot] ?? NaN) + energy;
      total += energy;
      moment += energy * frequencyHz;
    }
  }
  const peak = peakOf(smoothed(slots));
  return {
    centreHz: lowHz + widthHz / 2,
    meanHz: moment / total,
    peakEpochSeconds: firstEpochSeconds + (peak.slot + 0.5) * SLOT_SECONDS,
    peakEnergy: peak.energy / widthHz,
  };
}

function emptySlots(sources: readonly Source[], lowHz: number, highHz: number): { firstEpochSeconds: number; slots: Float64Array } {
  let firstEpochSeconds = Infinity;
  let last = -Infinity;
  for (const { distanceMetres, emitter } of sources) {
    firstEpochSeconds = Math.min(firstEpochSeconds, emitter.epochSeconds + travelSeconds({ frequencyHz: lowHz, distanceMetres }));
    last = Math.max(last, emitter.epochSeconds + travelSeconds({ frequencyHz: highHz, distanceMetres }));
  }
  return { firstEpochSeconds, slots: new Float64Array(Math.ceil((last - firstEpochSeconds) / SLOT_SECONDS) + 1) };
}

/** The highest slot, and between it and its neighbours the top of the parabola through them. */
function peakOf(slots: Float64Array): { slot: number; energy: number } {
  let top = 0;
  slots.forEach((energy, slot) => (top = energy > (slots[top] ?? NaN) ? slot : top));
  const [before, at, after] = [slots[top - 1] ?? 0, slots[top] ?? NaN, slots[top + 1] ?? 0];
  const bend = before - 2 * at + after;
  return { slot: top + (bend === 0 ? 0 : (0.5 * (before - after)) / bend), energy: at };
}

function smoothed(slots: Float64Array): Float64Array {
  const reach = Math.ceil((3 * SMOOTHING_SECONDS) / SLOT_SECONDS);
  const kernel = Array.from({ length: 2 * reach + 1 }, (_, i) => Math.exp(-0.5 * (((i - reach) * SLOT_SECONDS) / SMOOTHING_SECONDS) ** 2));
  return slots.map((_, slot) => {
    let sum = 0;
    kernel.forEach((weight, i) => (sum += weight * (slots[slot + i - reach] ?? 0)));
    return sum;
  });
}

const TIMED_SIGMA_SECONDS = 300;
const TIMED_SIGMA_FRACTION = 0.025;

function timedReadings(view: StationView, way: Extract<ReadingWay, { kind: "timed" }>): StationReading[] {
  const sources = sourcesAt(view);
  const first = Math.min(...sources.map((s) => s.emitter.epochSeconds + travelSeconds({ frequencyHz: LOW_HZ, distanceMetres: s.distanceMetres })));
  const last = Math.max(...sources.map((s) => s.emitter.epochSeconds + travelSeconds({ frequencyHz: HIGH_HZ, distanceMetres: s.distanceMetres })));
  const step = way.everyHours * 3600;
  const moments = Array.from({ length: Math.floor((last - first) / step) }, (_, i) => Math.ceil(first / step) * step + i * step);
  const seen = moments.map((epochSeconds) => ({ epochSeconds, ...wavesAt(sources, epochSeconds, view.storm.shape.spectrumSigmaHz) }));
  const fullest = Math.max(...seen.map((moment) => moment.energy));
  return seen
    .filter((moment) => moment.energy > LEAST_SHARE * fullest)
    .map((moment) => timedReading(view, moment, way.noiseFraction ?? TIMED_SIGMA_FRACTION));
}

/**
 * What runs up the shore at one moment. Each emitter's energy that arrives then has the one frequency
 * f = g (t - tau) / (4 pi D), in a density per unit time of its spectrum at f times |df/dt| = g / (4 pi D).
 */
function wavesAt(sources: readonly Source[], epochSeconds: number, sigmaHz: number): { energy: number; meanHz: number } {
  let energy = 0;
  let moment = 0;
  for (const { emitter, distanceMetres } of sources) {
    const rate = GRAVITY / (4 * Math.PI * distanceMetres);
    const frequencyHz = rate * (epochSeconds - emitter.epochSeconds);
    const share = rate * strength(frequencyHz, emitter.peakHz, sigmaHz);
    energy += share;
    moment += share * frequencyHz;
  }
  return { energy, meanHz: moment / energy };
}

function timedReading(view: StationView, moment: { epochSeconds: number; meanHz: number }, noiseFraction: number): StationReading {
  const frequencyHz = moment.meanHz * (1 + noiseFraction * view.random.normal());
  return {
    stationId: view.station.id,
    reading: {
      arrivalEpochSeconds: moment.epochSeconds,
      frequencyHz,
      arrivalSigmaSeconds: TIMED_SIGMA_SECONDS,
      frequencySigmaHz: TIMED_SIGMA_FRACTION * frequencyHz,
      kind: "timed",
      row: 0,
      bearing: null,
    },
  };
}

/** Stations around one ocean or along one coast, and a storm of any size, life and motion, read in one way. */
export function drawPhysicalEvent(choice: DrawnEvent & { readonly way: ReadingWay; readonly reachMetres?: number }): SimulatedEvent {
  const { random, way } = choice;
  const { stations, storm: centre } = drawNetwork(choice);
  const storm = drawStorm({ centre, originEpochSeconds: drawOrigin(random), random });
  const readings = stations.flatMap((station) => physicalReadings({ storm, station, random, way }));
  return { observations: observationsOf(stations, readings), truth: storm.truth, wrongStationId: null, clockOffsetSeconds: null };
}
