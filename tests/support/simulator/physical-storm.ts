import type { Position } from "#lib/core/units/position.ts";
import { pointAlong } from "./ellipsoid.ts";
import type { RandomStream } from "./random.ts";

/** A storm as its size, life and motion: everything Gaussian, sizes as standard deviations. */
export interface StormShape {
  readonly centre: Position;
  readonly originEpochSeconds: number;
  readonly sizeSigmaMetres: number;
  readonly lifeSigmaSeconds: number;
  readonly speedMetresPerSecond: number;
  readonly headsTowardDegrees: number;
  readonly peakHz: number;
  /** How fast the waves that it makes grow longer: fall of the peak frequency with time. */
  readonly peakFallHzPerSecond: number;
  readonly spectrumSigmaHz: number;
}

/** One patch of sea that makes waves at one moment, with a Gaussian spectrum of its own. */
export interface Emitter {
  readonly position: Position;
  readonly epochSeconds: number;
  readonly peakHz: number;
}

export interface PhysicalStorm {
  readonly shape: StormShape;
  readonly emitters: readonly Emitter[];
  /** Centre of all that was emitted. */
  readonly truth: { readonly position: Position; readonly originEpochSeconds: number };
}

const EMITTERS = 1600;

/**
 * The storm as a cloud of emitters of equal strength: a Halton sequence (1960) turned normal, so that the cloud is
 * even enough for its superposed spectra to be smooth.
 */
export function buildStorm(shape: StormShape): PhysicalStorm {
  const raw = Array.from({ length: EMITTERS }, (_, i) => normals(i + 1));
  const mean = ([0, 1, 2] as const).map((axis) => raw.reduce((sum, triple) => sum + triple[axis] / EMITTERS, 0));
  const emitters = raw.map(([east, north, late]): Emitter => {
    const after = (late - (mean[2] ?? 0)) * shape.lifeSigmaSeconds;
    const moved = shape.speedMetresPerSecond * after;
    const heading = (shape.headsTowardDegrees * Math.PI) / 180;
    const x = (east - (mean[0] ?? 0)) * shape.sizeSigmaMetres + moved * Math.sin(heading);
    const y = (north - (mean[1] ?? 0)) * shape.sizeSigmaMetres + moved * Math.cos(heading);
    return {
      position: pointAlong(shape.centre, { distanceMetres: Math.hypot(x, y), headsTowardDegrees: (Math.atan2(x, y) * 180) / Math.PI }),
      epochSeconds: shape.originEpochSeconds + after,
      peakHz: shape.peakHz - shape.peakFallHzPerSecond * after,
    };
  });
  return { shape, emitters, truth: { position: shape.centre, originEpochSeconds: shape.originEpochSeconds } };
}

export interface PlacedStorm {
  readonly centre: Position;
  readonly originEpochSeconds: number;
  readonly random: RandomStream;
}

/**
 * 150 to 400 km across its radius (two standard deviations), alive for 12 to 36 hours (four), moving at 5 to 20 m/s,
 * its waves growing longer by up to 0.02 Hz over its life. Common practice, no source.
 */
export function drawStorm(placed: PlacedStorm): PhysicalStorm {
  return buildStorm(drawShape(placed, { radiusKilometres: [150, 400], lifeHours: [12, 36], speed: [5, 20], fallHz: [0, 0.02] }));
}

/** As `drawStorm`, but none large or long-lived. */
export function drawModerateStorm(placed: PlacedStorm): PhysicalStorm {
  return buildStorm(drawShape(placed, { radiusKilometres: [150, 250], lifeHours: [12, 20], speed: [5, 12], fallHz: [0, 0.01] }));
}

type Span = readonly [number, number];

function drawShape(
  { centre, originEpochSeconds, random }: PlacedStorm,
  spans: { radiusKilometres: Span; lifeHours: Span; speed: Span; fallHz: Span },
): StormShape {
  const lifeSeconds = random.between(...spans.lifeHours) * 3600;
  return {
    centre,
    originEpochSeconds,
    sizeSigmaMetres: (random.between(...spans.radiusKilometres) * 1000) / 2,
    lifeSigmaSeconds: lifeSeconds / 4,
    speedMetresPerSecond: random.between(...spans.speed),
    headsTowardDegrees: random.between(0, 360),
    peakHz: random.between(0.058, 0.07),
    peakFallHzPerSecond: random.between(...spans.fallHz) / lifeSeconds,
    spectrumSigmaHz: random.between(0.009, 0.014),
  };
}

/** Three standard normal numbers of a quasi-random sequence. */
function normals(index: number): readonly [number, number, number] {
  const radius = Math.sqrt(-2 * Math.log(1 - halton(index, 2)));
  const turn = 2 * Math.PI * halton(index, 3);
  const late = Math.sqrt(-2 * Math.log(1 - halton(index, 5))) * Math.cos(2 * Math.PI * halton(index, 7));
  return [radius * Math.cos(turn), radius * Math.sin(turn), late];
}

function halton(index: number, base: number): number {
  let rest = index;
  let share = 1;
  let sum = 0;
  while (rest > 0) {
    share /= base;
    sum += share * (rest % base);
    rest = Math.floor(rest / base);
  }
  return sum;
}
