import { chosenObservations } from "../arrival/chosen-observations.ts";
import type { GatheredObservations } from "../arrival/gathered-observations.ts";
import { gatheringNotes } from "../arrival/gathering-notes.ts";
import type { ObservationChoices } from "../arrival/observation-choices.ts";
import { solveEvent, type EventProblem } from "./solve-event.ts";
import type { EventSolution } from "./solution.ts";

/** `solveEvent` on what was chosen of what was gathered, with what there is to say about that first among the warnings. */
export function solveGathered(problem: Omit<EventProblem, "observations"> & { readonly gathered: GatheredObservations; readonly choices: ObservationChoices }): EventSolution {
  const { gathered, choices, ...rest } = problem;
  const solution = solveEvent({ ...rest, observations: chosenObservations(gathered, choices) });
  return { ...solution, warnings: [...gatheringNotes(gathered, choices), ...solution.warnings] };
}
