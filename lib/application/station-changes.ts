import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { StationDescription } from "#lib/core/arrival/station-description.ts";
import { deploymentCells, stationCells } from "#lib/records/write-station-register.ts";

/** One thing that differs between two descriptions of a station, in the words of a stations file. */
export interface StationChange {
  /** The file's column, or `deployment` where a whole one came or went. */
  readonly field: string;
  /** Which deployment, counted from 1 in the newer description (the older for one that went); null for the station itself. */
  readonly deployment: number | null;
  /** As a stations file says it; empty where nothing was said. */
  readonly before: string;
  readonly after: string;
}

/** What differs, field by field; nothing where both say the same. */
export function stationChanges(before: StationDescription, after: StationDescription): StationChange[] {
  const own = differing(stationCells(before), stationCells(after), null);
  const { pairs, gone, come } = matched(before.deployments, after.deployments);
  const number = (list: readonly Deployment[], one: Deployment): number => list.indexOf(one) + 1;
  return [
    ...own,
    ...pairs.flatMap(([was, is]) => differing(deploymentCells(was), deploymentCells(is), number(after.deployments, is))),
    ...gone.map((one) => ({ field: "deployment", deployment: number(before.deployments, one), before: inShort(one), after: "" })),
    ...come.map((one) => ({ field: "deployment", deployment: number(after.deployments, one), before: "", after: inShort(one) })),
  ];
}

function differing(before: Readonly<Record<string, string>>, after: Readonly<Record<string, string>>, deployment: number | null): StationChange[] {
  return Object.keys(after)
    .filter((field) => before[field] !== after[field])
    .map((field) => ({ field, deployment, before: before[field] ?? "", after: after[field] ?? "" }));
}

/** Deployments that began together are one and the same; of the others, those that stand in the same order. */
function matched(before: readonly Deployment[], after: readonly Deployment[]) {
  const pairs: [Deployment, Deployment][] = [];
  const gone: Deployment[] = [];
  const left = new Set(after);
  for (const was of before) {
    const is = after.find((one) => one.fromEpochSeconds === was.fromEpochSeconds);
    if (is === undefined || !left.delete(is)) gone.push(was);
    else pairs.push([was, is]);
  }
  const come = [...left];
  while (gone.length > 0 && come.length > 0) {
    const [was, is] = [gone.shift(), come.shift()];
    if (was !== undefined && is !== undefined) pairs.push([was, is]);
  }
  return { pairs, gone, come };
}

function inShort(deployment: Deployment): string {
  const { name, latitude, longitude, from, to } = deploymentCells(deployment);
  return `${name}, ${latitude} ${longitude}, ${from === "" ? ".." : from}/${to === "" ? ".." : to}`;
}
