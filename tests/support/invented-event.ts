import type { EventToSave } from "#lib/application/ports.ts";
import type { Deployment, StationReading } from "#lib/core/arrival/observations.ts";

function reading(stationId: string, arrivalEpochSeconds: number, row: number): StationReading {
  const bearing = { comesFromDegrees: 211.5, sigmaDegrees: 12 };
  const measured = { frequencyHz: 0.1 / 3, arrivalSigmaSeconds: 1800, frequencySigmaHz: 0 };
  return {
    stationId,
    reading: { ...measured, arrivalEpochSeconds, kind: row === 2 ? "timed" : "ridge", row, bearing: row === 3 ? bearing : null },
  };
}

export const INVENTED_DEPLOYMENT: Deployment = {
  stationId: "north-mole",
  name: "North Mole",
  position: { latitudeDegrees: 44.625, longitudeDegrees: -124.53 },
  depthMetres: 130.5,
  sensor: "surface",
  exposure: { facesFromDegrees: 170, facesToDegrees: 350 },
  recordMinutes: 30,
  stamp: "middle",
  timeZone: "America/Los_Angeles",
  fromEpochSeconds: 800_000_000,
  toEpochSeconds: 830_000_000,
  shelf: [
    { lengthMetres: 20_000, depthMetres: 60 },
    { lengthMetres: 35_000, depthMetres: 140 },
  ],
};

/** Two deployments of one station, and one of another about which nothing more is known. */
const DEPLOYMENTS: readonly Deployment[] = [
  INVENTED_DEPLOYMENT,
  { ...INVENTED_DEPLOYMENT, name: "North Mole, outer", fromEpochSeconds: 830_000_000, toEpochSeconds: null, shelf: [] },
  {
    ...INVENTED_DEPLOYMENT,
    ...{ stationId: "far-rock", name: "Far Rock", depthMetres: null, sensor: "ground", exposure: null, shelf: [] },
    ...{ recordMinutes: null, stamp: null, timeZone: null, fromEpochSeconds: null, toEpochSeconds: null },
  },
];

/** An event that uses every field that can be kept. */
export function inventedEvent(id: string): EventToSave {
  return {
    id,
    title: `Storm ${id}`,
    note: "Made up for a test.",
    actor: "test",
    savedEpochSeconds: 1_700_000_000.25,
    observations: {
      deployments: DEPLOYMENTS,
      readings: [reading("north-mole", 821_000_000.5, 2), reading("north-mole", 821_010_000, 3)],
      estimates: [
        {
          stationId: "far-rock",
          row: 2,
          estimate: {
            distanceMetres: 5_123_456.789,
            originEpochSeconds: 820_000_000.125,
            covariance: { distanceVariance: 1.6e11, originVariance: 1.9e9, distanceOriginCovariance: -1.5e10 },
            sharedShifts: [{ cause: "bin-width", distanceMetres: 4e4, originSeconds: -3600 }],
            bearing: null,
          },
        },
      ],
    },
  };
}
