import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import type { LocatedStationJson, LocateJson } from "#lib/contracts/locate-json.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import type { EventSolution } from "#lib/core/source/solution.ts";
import { answerWords } from "#lib/presentation/answer-words.ts";
import { checkWords } from "#lib/presentation/check-words.ts";
import { figure, NO_FIGURE, percentWords, probabilityFigure, signedFigure, twoLeadingDigits } from "#lib/presentation/figures.ts";
import { sourceMark } from "#lib/presentation/marks.ts";
import { positionWords } from "#lib/presentation/positions.ts";
import { momentWords } from "#lib/presentation/times.ts";
import { provenanceText } from "./provenance-text.ts";
import { alignedRows, section } from "./table.ts";

const UNIT = "km";
const HEAD = ["Station", "ring km", "± km", "off km", "off h", "belongs", "without it km", "readings"];
const CAUTION = "Timing only, not height. Not for navigation and not a warning service; official warnings and licensed judgement come first.";

/** The answer of `locate` for people: the place first, then what stands behind it. */
export function locateText({ observations, solution, answer }: {
  readonly observations: EventObservations;
  readonly solution: EventSolution;
  readonly answer: LocateJson;
}): string {
  const stations = numberedStations(observations);
  const said = { solution, stations, settings: toEstimationSettings(answer.settings), unit: UNIT } as const;
  const words = answerWords(said);
  const checks = solution.answer === null ? null : checkWords({ ...said, answer: solution.answer });
  const numbers = new Map(stations.map(({ id, number }) => [id, number]));
  const refused = answer.stations.filter(({ error }) => error !== undefined);
  const fitted = answer.stations.filter(({ error }) => error === undefined);
  return [
    words.large.join("  "),
    ...(words.time === null ? [] : [words.time]),
    ...words.sources.map(({ mark, place, probability, time }) => `${mark}  ${place}  ${probability}  ${time}`),
    `${words.verdict} ${words.sentence}`,
    ...(words.sources.length > 0 ? [] : section("Possible sources", answer.modes.map(possibleSource))),
    ...section("Ruled out", answer.ruledOut.map((point) => `${at(point)}: ${point.reason}`)),
    ...section("Regions", answer.regions.map(({ probability, areaKm2 }) => `${percentWords(probability)}  ${figure(twoLeadingDigits(areaKm2))} km²`)),
    ...section("Stations", alignedRows([HEAD, ...fitted.map((station) => cells(station, numbers.get(station.id)))])),
    ...section("Not fitted", refused.map(({ id, error = "" }) => `${id}: ${error}`)),
    ...(checks === null ? [] : section("Checks", [
      `Leaving one out: ${checks.leavingOneOut}.`,
      `Low against high frequencies: ${checks.drift}.`,
      `Clocks: ${checks.clocks.join("; ")}.`,
    ])),
    "",
    ...provenanceText(answer),
    CAUTION,
  ].join("\n");
}

function possibleSource(mode: LocateJson["modes"][number], index: number): string {
  return `${sourceMark(index)}  ${at(mode)}  ${probabilityFigure(mode.probability)}  ${momentWords(Date.parse(mode.time) / 1000)}`;
}

function cells(station: LocatedStationJson, number: number | undefined): string[] {
  const { residual, belongs, leaveOneOutShiftKm } = station;
  return [
    `${number ?? ""} ${station.id}`.trim(),
    figure(station.ringKm ?? Number.NaN),
    figure(station.distanceSigmaKm ?? Number.NaN),
    residual === null ? NO_FIGURE : signedFigure(residual.distanceKm),
    residual === null ? NO_FIGURE : signedFigure(residual.timeHours, 1),
    belongs === null ? NO_FIGURE : probabilityFigure(belongs),
    leaveOneOutShiftKm === null ? NO_FIGURE : figure(leaveOneOutShiftKm),
    station.readingsUsed === 0 ? "sent in" : String(station.readingsUsed),
  ];
}

function at({ latitude, longitude }: { readonly latitude: number; readonly longitude: number }): string {
  return positionWords({ latitudeDegrees: latitude, longitudeDegrees: longitude });
}
