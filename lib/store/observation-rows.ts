import type { Deployment, StationEstimate, StationReading } from "#lib/core/arrival/observations.ts";
import type { Bearing } from "#lib/core/arrival/reading.ts";
import type { Prisma } from "./generated/client.ts";

/** Columns of a bearing, which readings and estimates share. */
function bearingColumns(bearing: Bearing | null) {
  return {
    comesFromDegrees: bearing?.comesFromDegrees ?? null,
    comesFromSigmaDegrees: bearing?.sigmaDegrees ?? null,
  };
}

export function deploymentRow(deployment: Deployment, ordinal: number): Prisma.DeploymentCreateInput {
  return {
    ordinal,
    station: { connect: { id: deployment.stationId } },
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
    shelf: {
      create: deployment.shelf.map((leg, place) => ({
        ordinal: place,
        lengthMetres: leg.lengthMetres,
        depthMetres: leg.depthMetres,
      })),
    },
  };
}

export function readingRow(eventId: string, item: StationReading, ordinal: number): Prisma.ReadingCreateManyInput {
  const { reading } = item;
  return {
    eventId,
    stationId: item.stationId,
    ordinal,
    sourceRow: reading.row,
    kind: reading.kind,
    arrivalEpochSeconds: reading.arrivalEpochSeconds,
    arrivalSigmaSeconds: reading.arrivalSigmaSeconds,
    frequencyHz: reading.frequencyHz,
    frequencySigmaHz: reading.frequencySigmaHz,
    ...bearingColumns(reading.bearing),
  };
}

export function estimateRow(eventId: string, item: StationEstimate, ordinal: number): Prisma.EstimateCreateManyInput {
  const { estimate } = item;
  return {
    eventId,
    stationId: item.stationId,
    ordinal,
    sourceRow: item.row,
    distanceMetres: estimate.distanceMetres,
    originEpochSeconds: estimate.originEpochSeconds,
    distanceVariance: estimate.covariance.distanceVariance,
    originVariance: estimate.covariance.originVariance,
    distanceOriginCovariance: estimate.covariance.distanceOriginCovariance,
    sharedShifts: JSON.stringify(estimate.sharedShifts),
    ...bearingColumns(estimate.bearing),
  };
}
