import type { Deployment, EventObservations } from "#lib/core/arrival/observations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { InputIssue } from "#lib/core/failures/input-error.ts";
import { readArrivalsCsv } from "./arrivals-csv.ts";
import type { Note, ReadResult } from "./note.ts";
import { collectProblems } from "./problems.ts";
import { readReadingsCsv } from "./readings-csv.ts";
import { readStationsCsv } from "./stations-csv.ts";

export interface TextFile {
  readonly text: string;
  readonly fileName: string;
}

export interface EventFiles {
  readonly stations: TextFile | null;
  readonly readings: TextFile | null;
  readonly arrivals: TextFile | null;
}

/**
 * One event's observations from its files, held against each other: with a stations file, every reading and every
 * estimate names one of its stations, and every reading's time lies within one of that station's deployments (its
 * first moment included, its last excluded unless nothing follows).
 *
 * @throws InputError with the problems of all files.
 */
export function readEventFiles(files: EventFiles): ReadResult<EventObservations> {
  const issues: InputIssue[] = [];
  const notes: Note[] = [];
  const read = <Value>(file: TextFile | null, reader: (text: string, fileName: string) => ReadResult<Value[]>): Value[] => {
    if (file === null) return [];
    return gather(issues, () => {
      const result = reader(file.text, file.fileName);
      notes.push(...result.notes);
      return result.value;
    });
  };
  const deployments = read(files.stations, readStationsCsv);
  const readings = read(files.readings, readReadingsCsv);
  const estimates = read(files.arrivals, readArrivalsCsv);
  const value = { deployments, readings, estimates };
  // Rows are only held against a stations file that could be read: otherwise every one of them would be a problem.
  if (files.stations !== null && deployments.length > 0) {
    const stationsFile = files.stations.fileName;
    gather(issues, () => requireKnownReadings(value, stationsFile, files.readings?.fileName ?? ""));
    gather(issues, () => requireKnownEstimates(value, stationsFile, files.arrivals?.fileName ?? ""));
  }
  if (issues.length > 0) throw new InputError(issues);
  return { value, notes };
}

function gather<Value>(issues: InputIssue[], read: () => Value[]): Value[] {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    issues.push(...error.issues);
    return [];
  }
}

function requireKnownReadings({ deployments, readings }: EventObservations, stationsFile: string, fileName: string): never[] {
  const problems = collectProblems(fileName);
  const ofStation = byStation(deployments);
  for (const { stationId, reading } of readings) {
    const own = ofStation.get(stationId);
    if (own === undefined) problems.add(unknownStation(reading.row, stationId, stationsFile, ofStation));
    else if (!own.some((deployment) => stoodAt(deployment, reading.arrivalEpochSeconds))) {
      const found = new Date(reading.arrivalEpochSeconds * 1000).toISOString();
      problems.add({ code: "no-deployment", row: reading.row, column: "time", found, wanted: `a time within a deployment of ${stationId} in ${stationsFile}` });
    }
  }
  problems.throwIfAny();
  return [];
}

function requireKnownEstimates({ deployments, estimates }: EventObservations, stationsFile: string, fileName: string): never[] {
  const problems = collectProblems(fileName);
  const ofStation = byStation(deployments);
  for (const { stationId, row } of estimates) {
    if (!ofStation.has(stationId)) problems.add(unknownStation(row, stationId, stationsFile, ofStation));
  }
  problems.throwIfAny();
  return [];
}

function byStation(deployments: readonly Deployment[]): Map<string, Deployment[]> {
  const ofStation = new Map<string, Deployment[]>();
  for (const deployment of deployments) {
    const own = ofStation.get(deployment.stationId);
    if (own === undefined) ofStation.set(deployment.stationId, [deployment]);
    else own.push(deployment);
  }
  return ofStation;
}

function stoodAt({ fromEpochSeconds, toEpochSeconds }: Deployment, epochSeconds: number): boolean {
  return (fromEpochSeconds ?? epochSeconds) <= epochSeconds && epochSeconds <= (toEpochSeconds ?? epochSeconds);
}

function unknownStation(row: number, found: string, stationsFile: string, ofStation: ReadonlyMap<string, unknown>) {
  const ids = [...ofStation.keys()];
  const named = ids.slice(0, 10).join(", ") + (ids.length > 10 ? ` and ${ids.length - 10} more` : "");
  return { code: "unknown-station", row, column: "station", found, wanted: `a station of ${stationsFile} (${named})` };
}
