import type { StationJson } from "#lib/contracts/api/stations.ts";

/** What stands in the form's fields, as it was typed. Rows carry a number of their own, by which the page tells them apart. */
export interface StationDraft {
  readonly id: string;
  readonly group: string;
  readonly licence: string;
  readonly attribution: string;
  readonly contact: string;
  readonly doi: string;
  readonly visibility: string;
  readonly embargoUntil: string;
  readonly note: string;
  readonly deployments: readonly DeploymentDraft[];
  readonly aliases: readonly AliasDraft[];
  readonly clockCorrections: readonly CorrectionDraft[];
}

export interface DeploymentDraft {
  readonly row: number;
  readonly name: string;
  readonly latitudeDegrees: string;
  readonly longitudeDegrees: string;
  readonly depthMetres: string;
  readonly sensor: string;
  readonly facesFromDegrees: string;
  readonly facesToDegrees: string;
  readonly recordMinutes: string;
  readonly stamp: string;
  readonly timeZone: string;
  readonly from: string;
  readonly to: string;
  readonly shelf: string;
}

export interface AliasDraft {
  readonly row: number;
  readonly scheme: string;
  readonly value: string;
}

export interface CorrectionDraft {
  readonly row: number;
  readonly from: string;
  readonly to: string;
  readonly fastBySeconds: string;
  readonly reason: string;
}

/** The next row's number: above all that are there. */
export function nextRow(rows: readonly { readonly row: number }[]): number {
  return rows.reduce((most, { row }) => Math.max(most, row), 0) + 1;
}

export function blankDeployment(row: number, like: Partial<DeploymentDraft> = {}): DeploymentDraft {
  const blank = { name: "", latitudeDegrees: "", longitudeDegrees: "", depthMetres: "", sensor: "surface", facesFromDegrees: "", facesToDegrees: "", recordMinutes: "", stamp: "", timeZone: "", from: "", to: "", shelf: "" };
  return { ...blank, ...like, row };
}

export function blankStation(): StationDraft {
  const blank = { id: "", group: "", licence: "", attribution: "", contact: "", doi: "", visibility: "group", embargoUntil: "", note: "" };
  return { ...blank, deployments: [blankDeployment(1)], aliases: [], clockCorrections: [] };
}

export function draftOf(station: StationJson): StationDraft {
  const text = (value: string | number | null): string => (value === null ? "" : String(value));
  const { id, group, visibility, note } = station;
  return {
    ...{ id, group, visibility, note },
    licence: text(station.licence),
    attribution: text(station.attribution),
    contact: text(station.contact),
    doi: text(station.doi),
    embargoUntil: timeText(station.embargoUntil),
    deployments: station.deployments.map((one, place) => ({
      row: place + 1,
      name: one.name,
      sensor: one.sensor,
      latitudeDegrees: text(one.latitudeDegrees),
      longitudeDegrees: text(one.longitudeDegrees),
      depthMetres: text(one.depthMetres),
      facesFromDegrees: text(one.facesFromDegrees),
      facesToDegrees: text(one.facesToDegrees),
      recordMinutes: text(one.recordMinutes),
      stamp: text(one.stamp),
      timeZone: text(one.timeZone),
      from: timeText(one.from),
      to: timeText(one.to),
      shelf: one.shelf.map(({ lengthKm, depthMetres }) => `${lengthKm}:${depthMetres}`).join(" "),
    })),
    aliases: station.aliases.map((alias, place) => ({ row: place + 1, ...alias })),
    clockCorrections: station.clockCorrections.map(({ from, to, fastBySeconds, reason }, place) => ({ row: place + 1, from: timeText(from), to: timeText(to), fastBySeconds: text(fastBySeconds), reason })),
  };
}

/** "2004-02-01T00:00Z", with seconds and their thousandths only where there are any. */
function timeText(time: string | null): string {
  return (time ?? "").replace(/\.000Z$/, "Z").replace(/:00Z$/, "Z");
}

/** The request that the draft asks for. What is no number goes as it was typed: the server says at which field what is wanted. */
export function requestOf(draft: StationDraft, revision: number): object {
  return {
    revision,
    deployments: draft.deployments.map(deploymentRequest),
    aliases: draft.aliases.map(({ scheme, value }) => ({ scheme: scheme.trim(), value: value.trim() })),
    clockCorrections: draft.clockCorrections.map(({ from, to, fastBySeconds, reason }) => ({ from: orNull(from), to: orNull(to), fastBySeconds: number(fastBySeconds), reason })),
    group: orNull(draft.group),
    licence: orNull(draft.licence),
    attribution: orNull(draft.attribution),
    contact: orNull(draft.contact),
    doi: orNull(draft.doi),
    visibility: draft.visibility,
    embargoUntil: orNull(draft.embargoUntil),
    note: draft.note,
  };
}

function deploymentRequest(draft: DeploymentDraft): object {
  return {
    name: draft.name,
    latitudeDegrees: number(draft.latitudeDegrees),
    longitudeDegrees: number(draft.longitudeDegrees),
    depthMetres: number(draft.depthMetres),
    sensor: draft.sensor,
    facesFromDegrees: number(draft.facesFromDegrees),
    facesToDegrees: number(draft.facesToDegrees),
    recordMinutes: number(draft.recordMinutes),
    stamp: orNull(draft.stamp),
    timeZone: orNull(draft.timeZone),
    from: orNull(draft.from),
    to: orNull(draft.to),
    shelf: draft.shelf.trim() === "" ? [] : draft.shelf.trim().split(/\s+/).map(legRequest),
  };
}

function legRequest(text: string): object {
  const colon = text.indexOf(":");
  return { lengthKm: number(colon < 0 ? text : text.slice(0, colon)), depthMetres: colon < 0 ? null : number(text.slice(colon + 1)) };
}

function orNull(text: string): string | null {
  return text.trim() === "" ? null : text.trim();
}

function number(text: string): number | string | null {
  const typed = text.trim().replace("\u2212", "-");
  if (typed === "") return null;
  return /^[+-]?(?:\d+\.?\d*|\.\d+)(?:e[+-]?\d+)?$/i.test(typed) ? Number(typed) : text.trim();
}
