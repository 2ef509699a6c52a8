import type { EventBroughtIn, StoredEvent } from "#lib/application/ports.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";

/** A stored event as it was brought in, where nothing was chosen or changed since. */
export function broughtIn(event: StoredEvent | null): EventBroughtIn | null {
  if (event === null) return null;
  const { id, title, note, observations } = event;
  return { id, title, note, observations: chosenObservations(observations, NO_CHOICES) };
}
