import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { ringSigmas } from "#lib/core/source/ring-sigma.ts";
import type { EstimationSettings } from "#lib/core/source/settings.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { areaWords, distanceWords, uncertainDistanceWords, type DistanceUnit } from "./distances.ts";
import { probabilityFigure, pValueWords } from "./figures.ts";
import { sourceMark } from "./marks.ts";
import { countWord, listWords, startingSentence } from "./numbers-in-words.ts";
import { positionParts, positionWords } from "./positions.ts";
import { plusMinusHours, uncertainMomentWords } from "./times.ts";

/** The answer as it is said first: large, then its time and error, then one or two sentences. */
export interface AnswerWords {
  readonly large: readonly string[];
  readonly time: string | null;
  /** Possible sources of which none stands out, each as large as the others. */
  readonly sources: readonly SourceWords[];
  readonly verdict: string;
  readonly sentence: string;
}

export interface SourceWords {
  /** Its letter, on the chart as well. */
  readonly mark: string;
  readonly place: string;
  readonly probability: string;
  readonly time: string;
}

interface Said {
  readonly solution: EventSolution;
  readonly stations: readonly NumberedStation[];
  readonly settings: EstimationSettings;
  readonly unit: DistanceUnit;
}

export function answerWords(said: Said): AnswerWords {
  const { answer } = said.solution;
  if (answer === null) return tooFew(said.solution);
  switch (answer.outcome) {
    case "located":
      return { ...placed(answer), verdict: "Located.", sentence: locatedSentence(answer, said) };
    case "several":
      return answer.modes.length > 1 ? severalWords(answer) : unsureWords(answer);
    case "ring-only":
    case "too-few":
      return ringOnly(said);
    case "no-agreement":
      return noAgreement(answer, said.unit);
  }
}

function placed(answer: SourceAnswer): Pick<AnswerWords, "large" | "time" | "sources"> {
  const { source } = answer;
  if (source === null) return { large: ["No place yet"], time: null, sources: [] };
  const { latitude, longitude } = positionParts(source.position);
  const moment = uncertainMomentWords(source.originEpochSeconds, source.originSigmaSeconds);
  return { large: [latitude, longitude], time: `${moment} ${plusMinusHours(source.originSigmaSeconds)}`, sources: [] };
}

function locatedSentence(answer: SourceAnswer, said: Said): string {
  const asked = answer.stations.length;
  const agree = answer.stations.filter(({ belongs }) => belongs !== null && belongs >= 0.5).length;
  const p = answer.fit === null ? "" : ` (${pValueWords(answer.fit.pValue)})`;
  const all = asked === 2 ? "Both" : `All ${countWord(asked)}`;
  const who = agree === asked ? `${all} stations` : `${startingSentence(countWord(agree))} stations of ${countWord(asked)}`;
  const stations = `${who} agree${clockSentence(answer, said)}${p}.`;
  const widest = answer.regions.find(({ probability }) => probability === 0.95);
  const region = widest ? ` The 95\u202f% region covers ${areaWords(widest.areaSquareMetres, said.unit)}.` : "";
  return stations + tooGoodSentence(answer) + region + landSentence(answer);
}

/** Scatter that is hardly ever so small where the errors are as large as allowed. */
function tooGoodSentence({ fit }: SourceAnswer): string {
  return fit !== null && fit.pValue > 0.99 ? " They agree better than the allowed errors expect: the region is probably cautious." : "";
}

/** A station whose clock was set aside agrees in its distance alone. */
function clockSentence(answer: SourceAnswer, said: Said): string {
  const suspect = answer.stations.filter(({ clockOffset }) => clockOffset !== null).map(({ id }) => id);
  const numbers = said.stations.filter(({ id }) => suspect.includes(id)).map(({ number }) => String(number));
  return numbers.length === 0 ? "" : `, but for the clock of ${listWords(numbers)}`;
}

function severalWords(answer: SourceAnswer): AnswerWords {
  const { modes, source } = answer;
  const sigmaSeconds = source?.originSigmaSeconds ?? 0;
  const sources = modes.map(({ position, probability, originEpochSeconds }, index) => ({
    mark: sourceMark(index),
    place: positionWords(position),
    probability: probabilityFigure(probability),
    time: uncertainMomentWords(originEpochSeconds, sigmaSeconds),
  }));
  return {
    large: [`${startingSentence(countWord(modes.length))} possible sources`],
    time: null,
    sources,
    verdict: "Not one place.",
    sentence: `The arrivals fit each of these places with the probability beside it. Residuals, checks and sight lines are for ${sourceMark(0)}; its time is known to ${plusMinusHours(sigmaSeconds)}.${landSentence(answer)}`,
  };
}

function unsureWords(answer: SourceAnswer): AnswerWords {
  const [first] = answer.modes;
  const share = first === undefined ? "too little" : probabilityFigure(first.probability);
  const sentence = `The best source holds ${share} of the probability; no other stands out.${landSentence(answer)}`;
  return { ...placed(answer), verdict: "Not surely placed.", sentence };
}

function landSentence(answer: SourceAnswer): string {
  if (!answer.source?.onLand) return "";
  const { bestInWater } = answer.source;
  const water = bestInWater === null ? "." : `; the best one in water is ${positionWords(bestInWater)}.`;
  return ` The most probable point lies on land${water}`;
}

/** One ring, or several that are one and the same circle. */
function ringOnly(said: Said): AnswerWords {
  const heard = said.solution.stations.flatMap((station) => {
    const estimate = outcomeEstimate(station.outcome);
    return estimate === null ? [] : [{ station, estimate }];
  });
  const [first] = heard;
  if (first === undefined) return tooFew(said.solution);
  const { station, estimate } = first;
  const { distanceSigmaMetres, originSigmaSeconds } = ringSigmas({ estimate, settings: said.settings, spreadRaisedBy: 1 });
  const number = said.stations.find(({ id }) => id === station.id)?.number ?? "";
  const where = `the storm stood somewhere on the ring about ${number}\u00a0${station.name}`;
  return {
    large: [uncertainDistanceWords(estimate.distanceMetres, distanceSigmaMetres, said.unit)],
    time: `${uncertainMomentWords(estimate.originEpochSeconds, originSigmaSeconds)} ${plusMinusHours(originSigmaSeconds)}`,
    sources: [],
    verdict: "Distance only.",
    sentence:
      heard.length === 1
        ? `One station gives a ring and a time, not a place: ${where}, in the part that it sees. The error is more than the readings’ own ${distanceWords(Math.sqrt(estimate.covariance.distanceVariance), said.unit)}: one station cannot tell a growing storm from a far one.`
        : `The stations stand at one place, or at one another’s antipodes, so their rings are one circle: ${where}.`,
  };
}

function tooFew(solution: EventSolution): AnswerWords {
  const refused = solution.stations.filter(({ outcome }) => outcome.kind === "refused");
  const names = listWords(refused.map(({ name }) => name));
  const sentence =
    solution.stations.length === 0
      ? "No station is included. Include one to see its ring, two or more to see a place."
      : `No ring could be drawn from ${names || "these stations"}; the table says why.`;
  return { large: ["No place yet"], time: null, sources: [], verdict: nothingVerdict(solution), sentence };
}

function nothingVerdict({ stations }: EventSolution): string {
  if (stations.length === 0) return "Too few stations.";
  const short = stations.every(({ outcome }) => outcome.kind === "refused" && outcome.code === "too-few-readings");
  return short ? "Too few readings." : "No ring.";
}

function noAgreement(answer: SourceAnswer, unit: DistanceUnit): AnswerWords {
  const miss = answer.fit === null ? "" : ` They miss a common point by ${distanceWords(answer.fit.ringMissMetres, unit)} (root mean square).`;
  return {
    large: ["No common source"],
    time: null,
    sources: [],
    verdict: "No agreement.",
    sentence: `These arrivals do not fit one storm.${miss} Leave stations out, or look for two storms.`,
  };
}
