import type { FitJson } from "#lib/contracts/fit-json.ts";
import type { StationJson } from "#lib/contracts/station-json.ts";
import { figure, NO_FIGURE, probabilityFigure } from "#lib/presentation/figures.ts";
import { momentWords } from "#lib/presentation/times.ts";
import { provenanceText } from "./provenance-text.ts";
import { alignedRows, section } from "./table.ts";

const HEAD = ["Station", "km", "± km", "storm at", "± h", "correlation", "p", "readings"];

/** The answer of `fit` for people. */
export function fitText(answer: FitJson): string {
  const fitted = answer.stations.filter(({ error }) => error === undefined);
  const refused = answer.stations.filter(({ error }) => error !== undefined);
  const down = answer.stations.filter(({ readingsDownweighted }) => readingsDownweighted.length > 0);
  return [
    ...alignedRows([HEAD, ...fitted.map(cells)]),
    ...section("Not fitted", refused.map(({ id, error = "" }) => `${id}: ${error}`)),
    ...section("Readings that count for less, by row", down.map(({ id, readingsDownweighted }) => `${id}: ${readingsDownweighted.join(", ")}`)),
    "",
    ...provenanceText(answer),
  ].join("\n");
}

function cells(station: StationJson): string[] {
  const { distanceKm, distanceSigmaKm, originTime, originTimeSigmaHours, correlation, pValue } = station;
  return [
    station.id,
    figure(distanceKm ?? Number.NaN),
    figure(distanceSigmaKm ?? Number.NaN),
    originTime === null ? NO_FIGURE : momentWords(Date.parse(originTime) / 1000),
    figure(originTimeSigmaHours ?? Number.NaN, 1),
    figure(correlation ?? Number.NaN, 2),
    pValue === null ? NO_FIGURE : probabilityFigure(pValue),
    station.readingsUsed === 0 ? "sent in" : String(station.readingsUsed),
  ];
}
