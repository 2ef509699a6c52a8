import type { Deployment, StationEstimate, StationReading } from "./observations.ts";
import type { QualityFlag } from "./quality.ts";

/** A reading as it was brought in: its time is what the station's clock said, its frequency as measured. */
export interface GatheredReading extends StationReading {
  readonly id: number;
  readonly arrivalId: number;
  readonly quality: QualityFlag;
}

export interface GatheredEstimate extends StationEstimate {
  readonly arrivalId: number;
}

/** How wrong a station's clock was over a span of its own time; ends that are null are open. */
export interface ClockCorrection {
  readonly stationId: string;
  readonly fromEpochSeconds: number | null;
  readonly toEpochSeconds: number | null;
  /** Positive: the clock was fast, and this is taken off its times. */
  readonly fastBySeconds: number;
  readonly reason: string;
}

/** All that was brought in for one event, before anybody chose what of it to use. */
export interface GatheredObservations {
  readonly deployments: readonly Deployment[];
  readonly readings: readonly GatheredReading[];
  readonly estimates: readonly GatheredEstimate[];
  readonly clockCorrections: readonly ClockCorrection[];
}
