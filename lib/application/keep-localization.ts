import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { withoutStations } from "#lib/core/arrival/without-stations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import type { PublicSettings } from "#lib/contracts/settings.ts";
import type { Host } from "./host.ts";
import { locateEvent } from "./locate-event.ts";
import type { EventStore, LocalizationStore } from "./ports.ts";

export interface AnswerToKeep {
  readonly eventId: string;
  /** Ids of stations of the event to leave out. */
  readonly leftOut: readonly string[];
  readonly settings: PublicSettings;
  readonly reason: string;
  readonly actor: string;
  readonly savedEpochSeconds: number;
  /** The number of the latest localization that was in view when the work began; 0 for none. */
  readonly startedFrom: number;
}

interface Keeping {
  readonly events: EventStore;
  readonly localizations: LocalizationStore;
  readonly host: Host;
}

export interface KeptAnswer {
  readonly number: number;
  readonly answer: LocateJson;
}

/**
 * Works an event's answer out anew from what is stored, whatever the browser showed, and keeps it for good with copies
 * of its readings, estimates, deployments and settings.
 *
 * @throws Refusal `not-found` for an event that nobody knows; `conflict` where another answer was saved meanwhile.
 * @throws InputError `unknown-station` for a station left out that the event does not have, `not-fitted` where no
 * station is left that can be fitted.
 */
export async function keepLocalization({ events, localizations, host }: Keeping, wanted: AnswerToKeep): Promise<KeptAnswer> {
  const event = await events.loadEvent(wanted.eventId);
  if (event === null) throw new Refusal("not-found", `No event "${wanted.eventId}" is stored.`);
  requireStations(event.observations, wanted.leftOut);
  const observations = withoutStations(event.observations, wanted.leftOut);
  const { solution, answer } = locateEvent({ observations, settings: wanted.settings, host });
  if (answer === null) {
    throw new InputError([{ code: "not-fitted", path: "leftOut", message: "No station is left that could be fitted, so there is no answer to keep." }]);
  }
  const { eventId, startedFrom, savedEpochSeconds, actor, reason, leftOut, settings } = wanted;
  const number = await localizations.saveLocalization({
    ...{ eventId, startedFrom, savedEpochSeconds, actor, reason, leftOut },
    program: host.program,
    nodeVersion: process.version,
    inputDigest: answer.inputDigest,
    settingsJson: JSON.stringify(settings),
    inputJson: JSON.stringify(observations),
    answerJson: JSON.stringify(answer),
    outcome: answer.outcome,
    source: solution.answer?.source ?? null,
  });
  return { number, answer };
}

function requireStations({ deployments }: EventObservations, leftOut: readonly string[]): void {
  const known = new Set(deployments.map(({ stationId }) => stationId));
  const issues = leftOut.flatMap((id, place) =>
    known.has(id) ? [] : [{ code: "unknown-station", path: `leftOut[${place}]`, message: `Station "${id}" is none of this event's.` }],
  );
  if (issues.length > 0) throw new InputError(issues);
}
