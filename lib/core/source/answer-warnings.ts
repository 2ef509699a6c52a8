import type { AnswerWarning, SourceAnswer, StationArrival } from "./answer.ts";

/** What a reader of the answer must be told beside its numbers, as whole sentences. */
export function answerWarnings(answer: Omit<SourceAnswer, "warnings">, arrivals: readonly StationArrival[]): AnswerWarning[] {
  return [...outcomeWarnings(answer), ...landWarnings(answer), ...stationWarnings(answer), ...fitWarnings(answer), ...sightWarnings(arrivals)];
}

function outcomeWarnings({ outcome, modes }: Omit<SourceAnswer, "warnings">): AnswerWarning[] {
  switch (outcome) {
    case "located":
      return [];
    case "several":
      return [{ code: "several-sources", message: modes.length > 1 ? `The arrivals allow ${modes.length} possible sources; the most probable is given first.` : "The best source does not hold enough of the probability to stand alone." }];
    case "ring-only":
      return [{ code: "ring-only", message: "One station knows a distance and a time only: the storm was somewhere on its ring, in the part that is in sight." }];
    case "too-few":
      return [{ code: "one-place", message: "The stations stand at one place, or at one another's antipodes, so their rings are one circle: only a distance and a time are known." }];
    case "no-agreement":
      return [{ code: "no-agreement", message: "The rings do not meet: no one storm explains half of the stations. Look for arrivals of different storms, or a wrong clock." }];
  }
}

function landWarnings({ source }: Omit<SourceAnswer, "warnings">): AnswerWarning[] {
  if (source && !source.atPeak) {
    return [{ code: "source-displaced", message: "Land, sight or exposure keeps the source from where the rings meet best. It stands at the densest place that is left, to the nearest cell of the search; leaving stations out and drift were not tried there." }];
  }
  if (!source?.onLand) return [];
  return [{ code: "source-on-land", message: "The best point lies on land; it is given as it was found, with the best point in the water beside it." }];
}

function stationWarnings({ stations, source }: Omit<SourceAnswer, "warnings">): AnswerWarning[] {
  if (!source) return [];
  return stations.flatMap(({ id, belongs, clockOffset }) => {
    const stray = belongs !== null && belongs < 0.5;
    return [
      ...(stray ? [{ code: "station-does-not-belong", message: `${id} probably saw another storm, or its clock is wrong: it does not belong to this answer (probability ${belongs < 0.01 ? "below 0.01" : belongs.toFixed(2)}).` }] : []),
      ...(clockOffset ? [{ code: "clock-suspect", message: clockSentence(id, clockOffset) }] : []),
    ];
  });
}

function clockSentence(id: string, { offsetSeconds, sigmaSeconds }: { offsetSeconds: number; sigmaSeconds: number }): string {
  const hours = Math.abs(offsetSeconds) / 3600;
  const days = Math.round(hours / 24);
  const wholeDays = days > 0 && Math.abs(hours - 24 * days) < (2 * sigmaSeconds) / 3600 ? `, as if ${days === 1 ? "a whole day" : `${days} whole days`} wrong` : "";
  return `${id}'s distance fits and its time does not: its clock is suspect, ${hours.toFixed(1)} ± ${(sigmaSeconds / 3600).toFixed(1)} h ${offsetSeconds > 0 ? "fast" : "slow"}${wholeDays}. Its distance is used and its time is not.`;
}

function fitWarnings({ fit, drift, spreadRaisedBy }: Omit<SourceAnswer, "warnings">): AnswerWarning[] {
  return [
    ...(spreadRaisedBy > 1 ? [{ code: "spread-raised", message: `The stations differ by more than the settings allow for, so the spread was raised ${spreadRaisedBy.toFixed(1)}-fold.` }] : []),
    ...(fit && fit.pValue < 0.01 ? [{ code: "poor-fit", message: `The stations that belong agree poorly (p = ${fit.pValue.toExponential(1)}).` }] : []),
    ...(drift?.significant ? [{ code: "moving-storm", message: "Low and high frequencies ask for different sources: the storm moved or lived long, and one point and time stand for its whole life." }] : []),
  ];
}

function sightWarnings(arrivals: readonly StationArrival[]): AnswerWarning[] {
  return arrivals.some((arrival) => arrival.sight === null)
    ? [{ code: "sight-off", message: "Land between source and stations was not held against a source." }]
    : [];
}
