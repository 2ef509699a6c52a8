import { expect, test } from "vitest";
import { locateEvent } from "#lib/application/locate-event.ts";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import type { Position } from "#lib/core/units/position.ts";
import { block, inventedLand } from "#tests/support/land.ts";
import { deploymentOf } from "#tests/support/simulator/simulated-event.ts";
import { exactArrivals, statedObservations, STORM_EPOCH_SECONDS } from "#tests/support/stated-arrivals.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });

test("a station that was moved sees what there is to see from where it heard the storm, not from its first place", () => {
  // A wall of land between 160 and 165 W: the first place lies east of it, the later one and the storm west.
  const land = inventedLand([block(-165, -160, -60, 60)]);
  const asked: Position[] = [];
  const sightFrom = (station: Position): SightTable => {
    asked.push(station);
    return buildSightTable({ station, land });
  };
  const first = at(10, -150);
  const later = at(10, 175);
  const told = statedObservations(exactArrivals({ stations: [{ id: "moved", position: later }, { id: "fixed", position: at(45, -178) }], storm: at(-5, 150) }));
  const spell = (position: Position, from: number | null, to: number | null): Deployment => ({
    ...deploymentOf({ id: "moved", position }),
    ...{ fromEpochSeconds: from, toEpochSeconds: to },
  });
  const movedOn = STORM_EPOCH_SECONDS - 10 * 86_400;
  const deployments = [spell(first, null, movedOn), spell(later, movedOn, null), ...told.deployments.slice(1)];
  const host = { program: "offing 0.0.0", land: { mask: () => land, sightFrom } };
  const { answer } = locateEvent({ observations: { ...told, deployments }, settings: DEFAULT_PUBLIC_SETTINGS, host });

  expect(asked).toEqual([later, at(45, -178)]);
  const moved = answer?.stations.find(({ id }) => id === "moved");
  expect(moved?.belongs).toBeGreaterThan(0.9);
  expect(answer?.modes.some(({ longitude }) => Math.abs(longitude - 150) < 5)).toBe(true);
});
