import { figure, roundedToError, signedFigure, twoLeadingDigits } from "./figures.ts";

/** The reader's unit of distance. Nautical mile: 1852 m, BIPM, The International System of Units, 8th edition, table 8. */
export type DistanceUnit = "km" | "nmi";

const METRES_IN = { km: 1000, nmi: 1852 } as const satisfies Record<DistanceUnit, number>;
const NAMES = { km: "kilometres", nmi: "nautical miles" } as const satisfies Record<DistanceUnit, string>;

export function isDistanceUnit(text: string | null | undefined): text is DistanceUnit {
  return text === "km" || text === "nmi";
}

export function distanceUnitName(unit: DistanceUnit): string {
  return NAMES[unit];
}

function inUnit(metres: number, unit: DistanceUnit): number {
  return metres / METRES_IN[unit];
}

/** The bare figure, for a column whose head names the unit. */
export function distanceFigure(metres: number, unit: DistanceUnit): string {
  return figure(inUnit(metres, unit));
}

export function signedDistanceFigure(metres: number, unit: DistanceUnit): string {
  return signedFigure(inUnit(metres, unit));
}

/** Figure and unit, for a sentence. */
export function distanceWords(metres: number, unit: DistanceUnit): string {
  return `${distanceFigure(metres, unit)}\u00a0${unit}`;
}

/** A distance and its error (1 sigma): the error to two digits, the distance to where they end. */
export function uncertainDistanceWords(metres: number, sigmaMetres: number, unit: DistanceUnit): string {
  const { value, error } = roundedToError(inUnit(metres, unit), inUnit(sigmaMetres, unit));
  return `${figure(value)} ±\u00a0${figure(error)}\u00a0${unit}`;
}

/** An area to two leading digits: regions are not known better. */
export function areaWords(squareMetres: number, unit: DistanceUnit): string {
  const area = squareMetres / METRES_IN[unit] ** 2;
  return `${figure(area < 100 ? area : twoLeadingDigits(area))}\u00a0${unit}²`;
}
