import { describe, expect, it } from "vitest";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import type { LandMask } from "#lib/core/geodesy/land-mask.ts";
import type { SourceAnswer } from "#lib/core/source/answer.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { solveEvent } from "#lib/core/source/solve-event.ts";
import type { Position } from "#lib/core/units/position.ts";
import { expectWithin } from "#tests/support/expect-within.ts";
import { block, inventedLand } from "#tests/support/land.ts";
import { legBetween } from "#tests/support/simulator/ellipsoid.ts";
import { exactArrivals, statedObservations } from "#tests/support/stated-arrivals.ts";

const at = (latitudeDegrees: number, longitudeDegrees: number): Position => ({ latitudeDegrees, longitudeDegrees });
const missOf = (from: Position | undefined, to: Position) => (from ? legBetween(from, to).distanceMetres : NaN);
const kilometre = { absolute: 1000, unit: "m", because: "exact statements" };

/** Two stations on the equator: whatever lies north of it has a mirror point as far south. */
const STATIONS = [
  { id: "west", position: at(0, -170) },
  { id: "east", position: at(0, -120) },
];
const [STORM, MIRROR] = [at(40, -150), at(-40, -150)];
const NOWHERE = [block(100, 101, 0, 1)];

interface Told {
  readonly land?: LandMask;
  readonly sighted?: boolean;
  readonly sight?: boolean;
  /** Bearings that the western station is open to. */
  readonly faces?: readonly [number, number];
  /** Direction that the eastern station measured. */
  readonly comesFromDegrees?: number;
}

function answerOf({ land, sighted = false, sight = true, faces, comesFromDegrees }: Told): SourceAnswer {
  const plain = statedObservations(exactArrivals({ stations: STATIONS, storm: STORM }));
  const exposure = faces ? { facesFromDegrees: faces[0], facesToDegrees: faces[1] } : null;
  const deployments = plain.deployments.map((deployment) => (deployment.stationId === "west" ? { ...deployment, exposure } : deployment));
  const bearing = comesFromDegrees === undefined ? null : { comesFromDegrees, sigmaDegrees: 15 };
  const estimates = plain.estimates.map((sent) => (sent.stationId === "east" ? { ...sent, estimate: { ...sent.estimate, bearing } } : sent));
  const sightTables = new Map(land && sighted ? STATIONS.map(({ id, position }) => [id, buildSightTable({ station: position, land })]) : []);
  const { answer } = solveEvent({ observations: { ...plain, deployments, estimates }, settings: { ...DEFAULT_SETTINGS, sight }, land: land ?? null, sightTables });
  if (answer === null) throw new Error("both stations say something");
  return answer;
}

function expectOnlyTheStorm(answer: SourceAnswer, reason: string): void {
  expect(answer.outcome).toBe("located");
  expectWithin(missOf(answer.source?.position, STORM), 0, kilometre);
  expect(answer.ruledOut.map((ruled) => ruled.reason)).toEqual([reason]);
  expectWithin(missOf(answer.ruledOut[0]?.position, MIRROR), 0, kilometre);
}

/** method.md 5: a floor of 0.02 for each station, so that a coastline's error never rules the truth out for good. */
function expectFaintMirror({ modes, outcome }: SourceAnswer, better: Position): void {
  expect(outcome).toBe("located");
  expectWithin(missOf(modes[0]?.position, better), 0, kilometre);
  const odds = (modes[1]?.probability ?? NaN) / (modes[0]?.probability ?? NaN);
  expectWithin(odds, 0.02, { absolute: 0.006, unit: "(ratio)", because: "and edges that are in sight" });
}

describe("of two possible sources", () => {
  it("both stand where nothing is against either", () => {
    const answer = answerOf({ land: inventedLand(NOWHERE), sighted: true });
    expect(answer.outcome).toBe("several");
    expect(answer.ruledOut).toEqual([]);
    for (const { probability } of answer.modes) expectWithin(probability, 0.5, { absolute: 0.01, unit: "(probability)", because: "mirror images" });
  });
  it("one is ruled out by land under it", () => {
    const land = inventedLand([block(-175, -125, -65, -20)]);
    expectOnlyTheStorm(answerOf({ land }), "it lies on land");
  });
  it("one is ruled out by land before it", () => {
    const land = inventedLand([block(-179, -115, -12, -8)]);
    expectOnlyTheStorm(answerOf({ land, sighted: true }), "land lies between it and east and west");
    expect(answerOf({ land, sighted: true, sight: false })).toMatchObject({ outcome: "several", ruledOut: [] });
    expect(answerOf({ land, sighted: true, sight: false }).warnings.map(({ code }) => code)).toContain("sight-off");
    expect(answerOf({ land, sighted: true }).warnings.map(({ code }) => code)).not.toContain("sight-off");
  });
  it("one is all but ruled out by land before it as one station has it", () => {
    const land = inventedLand([block(-178, -160, -12, -8)]);
    expectFaintMirror(answerOf({ land, sighted: true }), STORM);
  });
  it("one is all but ruled out by the bearings that a station is open to, also over north", () => {
    expectFaintMirror(answerOf({ faces: [330, 90] }), STORM);
    expectFaintMirror(answerOf({ faces: [91, 180] }), MIRROR);
    expect(answerOf({ faces: [0, 360] }).outcome).toBe("several");
    expect(answerOf({ faces: [40, 40] }).outcome).toBe("several");
  });
  it("one is ruled out by both, which name their station", () => {
    const land = inventedLand([block(-130, -112, -12, -8)]);
    expectOnlyTheStorm(
      answerOf({ land, sighted: true, faces: [330, 90] }),
      "land lies between it and east; it lies outside the bearings that west is open to",
    );
  });
  it("one is told by a direction, which is where waves come from", () => {
    const towardStorm = legBetween(at(0, -120), STORM).headsTowardDegrees;
    const answer = answerOf({ comesFromDegrees: towardStorm });
    expect(answer.outcome).toBe("located");
    expect(missOf(answer.source?.position, STORM)).toBeLessThan(300_000);
    expect(missOf(answerOf({ comesFromDegrees: 540 - towardStorm }).source?.position, MIRROR)).toBeLessThan(300_000);
  });
});
