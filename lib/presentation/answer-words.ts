import type { NumberedStation } from "#lib/core/arrival/numbered-stations.ts";
import { outcomeEstimate } from "#lib/core/arrival/outcome-estimate.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { areaWords, distanceWords, type DistanceUnit } from "./distances.ts";
import { percentWords, probabilityFigure } from "./figures.ts";
import { countWord, listWords, startingSentence } from "./numbers-in-words.ts";
import { positionParts, positionWords } from "./positions.ts";
import { plusMinusHours, uncertainMomentWords } from "./times.ts";

/** The answer as it is said first: large, then its time and error, then one or two sentences. */
export interface AnswerWords {
  readonly large: readonly string[];
  readonly time: string | null;
  readonly verdict: string;
  readonly sentence: string;
}

export function answerWords(said: {
  solution: EventSolution;
  stations: readonly NumberedStation[];
  unit: DistanceUnit;
}): AnswerWords {
  const { answer } = said.solution;
  if (answer === null) return tooFew(said.solution);
  switch (answer.outcome) {
    case "located":
      return { ...placed(answer), verdict: "Located.", sentence: locatedSentence(answer, said) };
    case "several":
      return { ...placed(answer), verdict: "Several possible sources.", sentence: severalSentence(answer) };
    case "ring-only":
      return ringOnly(said);
    case "too-few":
      return tooFew(said.solution);
    case "no-agreement":
      return noAgreement(answer, said.unit);
  }
}

function placed(answer: SourceAnswer): { large: string[]; time: string | null } {
  const { source } = answer;
  if (source === null) return { large: ["No place yet"], time: null };
  const { latitude, longitude } = positionParts(source.position);
  const moment = uncertainMomentWords(source.originEpochSeconds, source.originSigmaSeconds);
  return { large: [latitude, longitude], time: `${moment} ${plusMinusHours(source.originSigmaSeconds)}` };
}

function locatedSentence(answer: SourceAnswer, said: { unit: DistanceUnit }): string {
  const asked = answer.stations.length;
  const agree = answer.stations.filter(({ belongs }) => belongs !== null && belongs >= 0.5).length;
  const p = answer.fit === null ? "" : ` (p\u00a0${probabilityFigure(answer.fit.pValue)})`;
  const stations =
    agree === asked ? `All ${countWord(asked)} stations agree${p}.` : `${startingSentence(countWord(agree))} stations of ${countWord(asked)} agree${p}.`;
  const widest = answer.regions.find(({ probability }) => probability === 0.95);
  const region = widest ? ` The 95\u202f% region covers ${areaWords(widest.areaSquareMetres, said.unit)}.` : "";
  return stations + region + landSentence(answer);
}

function severalSentence(answer: SourceAnswer): string {
  const [first, second] = answer.modes;
  if (first === undefined) return landSentence(answer).trim();
  const others =
    second === undefined ? "" : ` The next is ${positionWords(second.position)} with ${percentWords(second.probability)}.`;
  return `The most probable of ${countWord(answer.modes.length)} has ${percentWords(first.probability)}.${others}${landSentence(answer)}`;
}

function landSentence(answer: SourceAnswer): string {
  if (!answer.source?.onLand) return "";
  const { bestInWater } = answer.source;
  const water = bestInWater === null ? "." : `; the best one in water is ${positionWords(bestInWater)}.`;
  return ` The most probable point lies on land${water}`;
}

function ringOnly(said: { solution: EventSolution; stations: readonly NumberedStation[]; unit: DistanceUnit }): AnswerWords {
  for (const { id, outcome, name } of said.solution.stations) {
    const estimate = outcomeEstimate(outcome);
    if (estimate === null) continue;
    const sigmaSeconds = Math.sqrt(estimate.covariance.originVariance);
    const number = said.stations.find((station) => station.id === id)?.number;
    return {
      large: [distanceWords(estimate.distanceMetres, said.unit)],
      time: `${uncertainMomentWords(estimate.originEpochSeconds, sigmaSeconds)} ${plusMinusHours(sigmaSeconds)}`,
      verdict: "Distance only.",
      sentence: `One station gives a ring and a time, not a place: the storm stood somewhere on the ring about ${number === undefined ? "" : `${number}\u00a0`}${name}, in the part that it sees.`,
    };
  }
  return tooFew(said.solution);
}

function tooFew(solution: EventSolution): AnswerWords {
  const refused = solution.stations.filter(({ outcome }) => outcome.kind === "refused");
  const names = listWords(refused.map(({ name }) => name));
  const sentence =
    solution.stations.length === 0
      ? "No station is included. Include one to see its ring, two or more to see a place."
      : `No ring could be drawn from ${names || "these stations"}; the table says why.`;
  return { large: ["No place yet"], time: null, verdict: "Too few readings.", sentence };
}

function noAgreement(answer: SourceAnswer, unit: DistanceUnit): AnswerWords {
  const miss = answer.fit === null ? "" : ` They miss a common point by ${distanceWords(answer.fit.ringMissMetres, unit)} (root mean square).`;
  return {
    large: ["No common source"],
    time: null,
    verdict: "No agreement.",
    sentence: `These arrivals do not fit one storm.${miss} Leave stations out, or look for two storms.`,
  };
}
