import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import type { GatheredObservations } from "#lib/core/arrival/gathered-observations.ts";
import { gatheringNotes } from "#lib/core/arrival/gathering-notes.ts";
import type { ObservationChoices } from "#lib/core/arrival/observation-choices.ts";
import { InputError, type InputIssue } from "#lib/core/failures/input-error.ts";
import { Refusal } from "#lib/core/failures/refusal.ts";
import type { LocateJson } from "#lib/contracts/locate-json.ts";
import type { PublicSettings } from "#lib/contracts/settings.ts";
import type { Host } from "./host.ts";
import { locateEvent } from "./locate-event.ts";
import type { Doing, EventStore, LocalizationStore, StoredEvent } from "./ports.ts";

export interface AnswerToKeep extends Doing {
  readonly eventId: string;
  readonly choices: ObservationChoices;
  readonly settings: PublicSettings;
  readonly reason: string;
  /** The number of the latest localization that was in view when the work began; 0 for none. */
  readonly startedFrom: number;
  /** The event's revision in view; null where its maker does not say. */
  readonly eventRevision: number | null;
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
 * Works an event's answer out anew from what is stored and what was chosen of it, whatever the browser showed, and keeps
 * it for good with copies of its readings, estimates, deployments and settings.
 *
 * @throws Refusal `not-found` for an event that nobody knows; `conflict` where another answer was saved meanwhile, or the
 *   event was changed.
 * @throws InputError `unknown-station` and `unknown-reading` for choices that name what the event does not have,
 *   `not-fitted` where no station is left that can be fitted.
 */
export async function keepLocalization({ events, localizations, host }: Keeping, wanted: AnswerToKeep): Promise<KeptAnswer> {
  const event = await events.loadEvent(wanted.eventId);
  if (event === null) throw new Refusal("not-found", `No event "${wanted.eventId}" is stored.`);
  requireUnchanged(event, wanted.eventRevision);
  const { eventId, startedFrom, savedEpochSeconds, actor, reason, choices, settings } = wanted;
  requireKnown(event.observations, choices);
  // The store asks this again; it is asked here so that no answer is worked out in vain.
  await localizations.requireLatest(eventId, startedFrom);
  const observations = chosenObservations(event.observations, choices);
  const { solution, answer } = locateEvent({ observations, settings, notes: gatheringNotes(event.observations, choices), host });
  if (answer === null) {
    throw new InputError([{ code: "not-fitted", path: "leftOut", message: "No station is left that could be fitted, so there is no answer to keep." }]);
  }
  const number = await localizations.saveLocalization({
    ...{ eventId, startedFrom, savedEpochSeconds, actor, reason, choices },
    eventRevision: event.revision,
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

/** Before anything is worked out of it; the store asks again when it saves, for the event may change meanwhile. */
function requireUnchanged({ id, revision, mergedInto }: StoredEvent, seen: number | null): void {
  if (mergedInto !== null) throw new Refusal("conflict", `Event "${id}" was merged into "${mergedInto}" and takes no more answers.`);
  if (seen === null || seen === revision) return;
  throw new Refusal("conflict", `Event "${id}" was changed meanwhile: it is at revision ${revision}, and this answer is of revision ${seen}.`);
}

function requireKnown({ deployments, readings }: GatheredObservations, choices: ObservationChoices): void {
  const stations = new Set(deployments.map(({ stationId }) => stationId));
  const known = new Set(readings.map(({ id }) => id));
  const station = (path: string, id: string): InputIssue[] =>
    stations.has(id) ? [] : [{ code: "unknown-station", path, message: `${path}: found "${id}"; wanted a station of this event.` }];
  const reading = (path: string, id: number): InputIssue[] =>
    known.has(id) ? [] : [{ code: "unknown-reading", path, message: `${path}: found ${id}; wanted a reading of this event.` }];
  const issues = [
    ...choices.leftOutStationIds.flatMap((id, place) => station(`leftOut[${place}]`, id)),
    ...choices.droppedReadingIds.flatMap((id, place) => reading(`dropped[${place}]`, id)),
    ...choices.movedReadings.flatMap(({ readingId }, place) => reading(`moved[${place}].reading`, readingId)),
    ...choices.addedReadings.flatMap(({ stationId }, place) => station(`added[${place}].station`, stationId)),
  ];
  if (issues.length > 0) throw new InputError(issues);
}
