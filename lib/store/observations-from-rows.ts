import { z } from "zod";
import type { GatheredEstimate, GatheredReading } from "#lib/core/arrival/gathered-observations.ts";
import type { Deployment } from "#lib/core/arrival/observations.ts";
import { QUALITY_FLAGS } from "#lib/core/arrival/quality.ts";
import type { Bearing } from "#lib/core/arrival/reading.ts";
import type { Prisma } from "./generated/client.ts";

const Sensor = z.enum(["surface", "pressure", "ground"]);
const Stamp = z.enum(["start", "middle", "end"]).nullable();
const Kind = z.enum(["ridge", "timed"]);
const Quality = z.literal(QUALITY_FLAGS);
const SharedShifts = z.array(
  z.object({ cause: z.enum(["timed-readings", "bin-width"]), distanceMetres: z.number(), originSeconds: z.number() }),
);

function bearingOf(row: { comesFromDegrees: number | null; comesFromSigmaDegrees: number | null }): Bearing | null {
  if (row.comesFromDegrees === null || row.comesFromSigmaDegrees === null) return null;
  return { comesFromDegrees: row.comesFromDegrees, sigmaDegrees: row.comesFromSigmaDegrees };
}

export function deploymentFromRow(row: Prisma.DeploymentGetPayload<{ include: { shelf: true } }>): Deployment {
  const { facesFromDegrees, facesToDegrees } = row;
  const isOpenAllRound = facesFromDegrees === null || facesToDegrees === null;
  return {
    stationId: row.stationId,
    name: row.name,
    position: { latitudeDegrees: row.latitudeDegrees, longitudeDegrees: row.longitudeDegrees },
    depthMetres: row.depthMetres,
    sensor: Sensor.parse(row.sensor),
    exposure: isOpenAllRound ? null : { facesFromDegrees, facesToDegrees },
    recordMinutes: row.recordMinutes,
    stamp: Stamp.parse(row.stamp),
    timeZone: row.timeZone,
    fromEpochSeconds: row.fromEpochSeconds,
    toEpochSeconds: row.toEpochSeconds,
    shelf: row.shelf.map((leg) => ({ lengthMetres: leg.lengthMetres, depthMetres: leg.depthMetres })),
  };
}

interface OfStation {
  readonly arrival: { readonly stationId: string };
}

export function readingFromRow(row: Prisma.ReadingGetPayload<object> & OfStation): GatheredReading {
  return {
    id: row.id,
    arrivalId: row.arrivalId,
    quality: Quality.parse(row.quality),
    stationId: row.arrival.stationId,
    reading: {
      arrivalEpochSeconds: row.arrivalEpochSeconds,
      frequencyHz: row.frequencyHz,
      arrivalSigmaSeconds: row.arrivalSigmaSeconds,
      frequencySigmaHz: row.frequencySigmaHz,
      kind: Kind.parse(row.kind),
      row: row.sourceRow,
      bearing: bearingOf(row),
    },
  };
}

export function estimateFromRow(row: Prisma.EstimateGetPayload<object> & OfStation): GatheredEstimate {
  return {
    arrivalId: row.arrivalId,
    stationId: row.arrival.stationId,
    row: row.sourceRow,
    estimate: {
      distanceMetres: row.distanceMetres,
      originEpochSeconds: row.originEpochSeconds,
      covariance: {
        distanceVariance: row.distanceVariance,
        originVariance: row.originVariance,
        distanceOriginCovariance: row.distanceOriginCovariance,
      },
      sharedShifts: SharedShifts.parse(JSON.parse(row.sharedShifts)),
      bearing: bearingOf(row),
    },
  };
}
