import type { ArrivalEstimate } from "#lib/core/arrival/estimate.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import type { QualityFlag } from "#lib/core/arrival/quality.ts";
import type { Bearing, Reading } from "#lib/core/arrival/reading.ts";
import type { Prisma } from "./generated/client.ts";

/** Columns of a bearing, which readings and estimates share. */
function bearingColumns(bearing: Bearing | null) {
  return {
    comesFromDegrees: bearing?.comesFromDegrees ?? null,
    comesFromSigmaDegrees: bearing?.sigmaDegrees ?? null,
  };
}

export function deploymentRow(deployment: Deployment, ordinal: number) {
  return {
    ordinal,
    stationId: deployment.stationId,
    name: deployment.name,
    latitudeDegrees: deployment.position.latitudeDegrees,
    longitudeDegrees: deployment.position.longitudeDegrees,
    depthMetres: deployment.depthMetres,
    sensor: deployment.sensor,
    facesFromDegrees: deployment.exposure?.facesFromDegrees ?? null,
    facesToDegrees: deployment.exposure?.facesToDegrees ?? null,
    recordMinutes: deployment.recordMinutes,
    stamp: deployment.stamp,
    timeZone: deployment.timeZone,
    fromEpochSeconds: deployment.fromEpochSeconds,
    toEpochSeconds: deployment.toEpochSeconds,
    shelf: deployment.shelf.map(({ lengthMetres, depthMetres }) => ({ lengthMetres, depthMetres })),
  };
}

export function readingRow(arrivalId: number, { reading, quality }: { reading: Reading; quality: QualityFlag }): Prisma.ReadingCreateManyInput {
  return {
    arrivalId,
    sourceRow: reading.row,
    kind: reading.kind,
    arrivalEpochSeconds: reading.arrivalEpochSeconds,
    arrivalSigmaSeconds: reading.arrivalSigmaSeconds,
    frequencyHz: reading.frequencyHz,
    frequencySigmaHz: reading.frequencySigmaHz,
    ...bearingColumns(reading.bearing),
    quality,
  };
}

export function estimateRow(arrivalId: number, { estimate, row }: { estimate: ArrivalEstimate; row: number }): Prisma.EstimateCreateManyInput {
  return {
    arrivalId,
    sourceRow: row,
    distanceMetres: estimate.distanceMetres,
    originEpochSeconds: estimate.originEpochSeconds,
    distanceVariance: estimate.covariance.distanceVariance,
    originVariance: estimate.covariance.originVariance,
    distanceOriginCovariance: estimate.covariance.distanceOriginCovariance,
    sharedShifts: JSON.stringify(estimate.sharedShifts),
    ...bearingColumns(estimate.bearing),
  };
}
