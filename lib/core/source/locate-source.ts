import { geodesicInverse } from "../geodesy/geodesic.ts";
import { HALF_GIRTH_METRES } from "../geodesy/earth.ts";
import type { LandMask } from "../geodesy/land-mask.ts";
import { ringCrossings } from "../geodesy/ring-crossings.ts";
import { agreementAtPeaks, agreementProbability } from "./agreement.ts";
import type { ConfidenceRegion, PossibleSource, SourceAnswer, SourceOutcome, StationArrival, StationVerdict } from "./answer.ts";
import { driftBetweenHalves } from "./drift-check.ts";
import { fitAtPeak, type FitAtPeak } from "./fit-at-peak.ts";
import { leaveOneOutShifts } from "./leave-one-out.ts";
import type { Network } from "./network.ts";
import { placePossibleSources, whatIsRuledOut, type PlacedMode } from "./possible-sources.ts";
import { prepareNetwork, type Prepared } from "./prepare-network.ts";
import { regionGeometry } from "./region-geometry.ts";
import { cellsHolding, logMass, logTotal } from "./regions.ts";
import { searchOcean, type Posterior, type SearchInput } from "./search.ts";
import type { EstimationSettings } from "./settings.ts";
import { answerWarnings } from "./answer-warnings.ts";

export interface LocateOptions {
  readonly settings: EstimationSettings;
  /** Null: the whole Earth is taken as ocean. */
  readonly land: LandMask | null;
  /** False leaves out leave-one-out and drift, for runs that only ask where and how surely. */
  readonly checks?: boolean;
}

const REGION_PROBABILITIES = [0.5, 0.9, 0.95] as const;
/** The best source stands alone where it holds this much of the probability. */
const ALONE_PROBABILITY = 0.95;
/** Where no peak comes near to agreeing, the ocean is not searched for more. */
const HOPELESS_AGREEMENT = 1e-4;
/** Stations nearer to one another, or to one another's antipode, than this tell one ring between them. */
const ONE_PLACE_METRES = 50_000;

/**
 * Where and when the storm was that several stations' arrivals tell of, and how surely.
 *
 * Order of work: stations that agree are found and the spread raised where they ask for it; a suspect clock is set
 * aside; the posterior is laid over the ocean; its modes are the possible sources; regions hold their probability.
 * The answer does not depend on the order of the arrivals, and the same arrivals give the same answer to the last bit.
 * Takes at least one arrival; with one the answer is a ring. [source: tarantola-valette-1982, collard-2009]
 */
export function locateSource(arrivals: readonly StationArrival[], options: LocateOptions): SourceAnswer {
  const sorted = [...arrivals].sort((a, b) => (a.id < b.id ? -1 : 1));
  const prepared = prepareNetwork(sorted, options);
  const input: SearchInput = { network: prepared.network, sets: prepared.sets, land: options.land };
  const crossings = pairwiseCrossings(arrivals);
  if (sorted.length > 1 && agreementAtPeaks(prepared.network, prepared.peaks) < HOPELESS_AGREEMENT) {
    return unplaced({ outcome: standAtOnePlace(sorted) ? "too-few" : "no-agreement", arrivals, regions: [], crossings });
  }
  const posterior = searchOcean(input, prepared.peaks);
  const regions = REGION_PROBABILITIES.map((probability) => regionHolding(posterior, probability));
  const placed = sorted.length > 1 ? placePossibleSources(input, posterior) : [];
  const [main] = placed;
  const outcome = outcomeOf(prepared.network, posterior, placed);
  if (!main || (outcome !== "located" && outcome !== "several")) return unplaced({ outcome, arrivals, regions, crossings });

  const fit = fitAtPeak(input, main, belongingOver(posterior, sorted.length), prepared.clocksSetAside);
  const verdicts = verdictsOf({ input, main, fit, prepared, checks: options.checks !== false });
  const answer: Omit<SourceAnswer, "warnings"> = {
    outcome,
    source: {
      position: main.position,
      originEpochSeconds: input.network.zeroEpochSeconds + main.originSeconds,
      originSigmaSeconds: originSigma(main),
      atPeak: main.peak !== null,
      onLand: main.onLand,
      bestInWater: main.bestInWater,
    },
    regions,
    modes: placed.map((source) => possibleSource(input.network, source)),
    ruledOut: whatIsRuledOut(input, posterior, placed),
    stations: arrivals.flatMap((arrival) => verdicts.get(arrival.id) ?? []),
    crossings,
    fit: fit.summary,
    drift: options.checks !== false && fit.peak ? driftBetweenHalves(belonging(sorted, fit), prepared.options, fit.peak) : null,
    spreadRaisedBy: Math.sqrt(prepared.network.spreadVarianceFactor),
  };
  return { ...answer, warnings: answerWarnings(answer, arrivals) };
}

function possibleSource({ zeroEpochSeconds }: Network, { mode, position, originSeconds }: PlacedMode): PossibleSource {
  return { probability: mode.probability, position, originEpochSeconds: zeroEpochSeconds + originSeconds };
}

function regionHolding(posterior: Posterior, probability: number): ConfidenceRegion {
  const cells = cellsHolding(posterior.cells, probability);
  return {
    probability,
    areaSquareMetres: cells.reduce((sum, cell) => sum + cell.areaSquareMetres, 0),
    geometry: regionGeometry(cells.map((cell) => cell.cell)),
  };
}

/** Agreement asks for two stations at least, and for half of them: fewer are somebody else's storm. */
function outcomeOf(network: Network, posterior: Posterior, placed: readonly PlacedMode[]): SourceOutcome {
  if (network.size === 1) return "ring-only";
  if (standAtOnePlace(network.arrivals)) return "too-few";
  const belongs = belongingOver(posterior, network.size).filter((probability) => probability >= 0.5).length;
  const agreed = agreementProbability(network, posterior.cells) >= 0.5 && belongs >= 2 && 2 * belongs >= network.size;
  if (!agreed) return "no-agreement";
  return (placed[0]?.mode.probability ?? 0) >= ALONE_PROBABILITY ? "located" : "several";
}

function standAtOnePlace(arrivals: readonly StationArrival[]): boolean {
  return arrivals.every((arrival) => {
    const from = arrivals[0]?.position ?? arrival.position;
    const { distanceMetres } = geodesicInverse({ from, to: arrival.position });
    return distanceMetres < ONE_PLACE_METRES || HALF_GIRTH_METRES - distanceMetres < ONE_PLACE_METRES;
  });
}

/** Probability of belonging by station, over the whole posterior. */
function belongingOver(posterior: Posterior, size: number): number[] {
  const total = logTotal(posterior.cells.map(logMass));
  const sums = new Float64Array(size);
  for (const cell of posterior.cells) {
    const share = Math.exp(logMass(cell) - total);
    cell.belongs.forEach((value, i) => (sums[i] = (sums[i] ?? 0) + share * value));
  }
  return Array.from(sums, (sum) => Math.min(1, sum));
}

function belonging(arrivals: readonly StationArrival[], fit: FitAtPeak): StationArrival[] {
  return arrivals.filter((_, i) => !fit.stray.includes(i));
}

/** Standard deviation (s) of t0 about the reported one, over the main source's cells. */
function originSigma({ mode, originSeconds }: PlacedMode): number {
  const total = logTotal(mode.cells.map(logMass));
  const variance = mode.cells.reduce((sum, cell) => {
    return sum + Math.exp(logMass(cell) - total) * (cell.originVariance + (cell.originMean - originSeconds) ** 2);
  }, 0);
  return Math.sqrt(variance);
}

function verdictsOf({ input, main, fit, prepared, checks }: {
  readonly input: SearchInput;
  readonly main: PlacedMode;
  readonly fit: FitAtPeak;
  readonly prepared: Prepared;
  readonly checks: boolean;
}): Map<string, StationVerdict> {
  const { network } = input;
  const shifts = checks && fit.peak ? leaveOneOutShifts(network, fit.peak, prepared.clocksSetAside) : [];
  return new Map(
    network.arrivals.map((arrival, i) => [
      arrival.id,
      {
        id: arrival.id,
        residual: {
          distanceMetres: arrival.estimate.distanceMetres - (fit.distances[i] ?? NaN),
          originSeconds: (network.origins[i] ?? NaN) - main.originSeconds,
        },
        belongs: fit.belongs[i] ?? 0,
        leaveOneOutShiftMetres: shifts[i] ?? null,
        clockOffset: prepared.clock?.index === i ? { offsetSeconds: prepared.clock.offsetSeconds, sigmaSeconds: prepared.clock.sigmaSeconds } : null,
      },
    ]),
  );
}

function pairwiseCrossings(arrivals: readonly StationArrival[]): SourceAnswer["crossings"] {
  const ringOf = (arrival: StationArrival) => ({ centre: arrival.position, radiusMetres: Math.min(arrival.estimate.distanceMetres, HALF_GIRTH_METRES) });
  return arrivals.flatMap((first, i) =>
    arrivals.slice(i + 1).map((second) => {
      const met = ringCrossings({ first: ringOf(first), second: ringOf(second) });
      return { stations: [first.id, second.id] as const, points: met.kind === "cross" || met.kind === "touch" ? met.points : [] };
    }),
  );
}

function unplaced({ outcome, arrivals, regions, crossings }: {
  readonly outcome: SourceOutcome;
  readonly arrivals: readonly StationArrival[];
  readonly regions: readonly ConfidenceRegion[];
  readonly crossings: SourceAnswer["crossings"];
}): SourceAnswer {
  const answer = {
    outcome,
    source: null,
    // Rings that do not agree have no common region.
    regions: outcome === "no-agreement" ? [] : regions,
    modes: [],
    ruledOut: [],
    stations: arrivals.map(({ id }) => ({ id, residual: null, belongs: null, leaveOneOutShiftMetres: null, clockOffset: null })),
    crossings,
    fit: null,
    drift: null,
    spreadRaisedBy: 1,
  };
  return { ...answer, warnings: answerWarnings(answer, arrivals) };
}

