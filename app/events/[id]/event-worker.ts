import { bandOverlaps } from "#lib/chart/band-overlaps.ts";
import { eventLayers } from "#lib/chart/event-layers.ts";
import { buildLandMask } from "#lib/core/geodesy/land-mask.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import { solveGathered } from "#lib/core/source/solve-gathered.ts";
import { fetchLand } from "../../_components/chart/fetch-land.ts";
import { sightOfStations } from "./sight-of-stations.ts";
import type { Drawn, WorkerReport, WorkerRequest } from "./worker-messages.ts";

type Opening = Extract<WorkerRequest, { kind: "open" }>;
type Question = Exclude<WorkerRequest, Opening>;

/** Works out and draws one event away from the page, so that the page stays quick under the hand. */
function workOnEvents(): (request: WorkerRequest) => void {
  let answerQuestion: ((question: Question) => void) | null = null;
  const waiting: Question[] = [];

  return (request) => {
    if (request.kind !== "open") {
      if (answerQuestion === null) waiting.push(request);
      else answerQuestion(request);
      return;
    }
    openEvent(request)
      .then((answer) => {
        answerQuestion = answer;
        waiting.splice(0).forEach(answer);
      })
      .catch((error: unknown) => {
        reportFailure(0, error);
      });
  };
}

async function openEvent(opening: Opening): Promise<(question: Question) => void> {
  const topology = await fetchLand();
  const land = buildLandMask(topology);
  const sightTables = opening.settings.sight ? sightOfStations(opening.observations, land) : new Map<string, SightTable>();
  const drawing = { window: opening.window, settings: opening.settings, sightTables };
  let shown = opening.solution;

  const show = ({ ask, choices, solution }: Omit<Drawn, "layers">): void => {
    shown = solution;
    report({ kind: "drawn", ask, choices, solution, layers: eventLayers({ ...drawing, solution }) });
  };
  show({ ask: 0, choices: opening.choices, solution: opening.solution });

  return (question) => {
    try {
      if (question.kind === "overlap") {
        const areas = bandOverlaps({ ...drawing, solution: shown, focus: question.focus });
        report({ kind: "overlap", ask: question.ask, areas });
        return;
      }
      const { ask, choices } = question;
      const solution = solveGathered({ gathered: opening.observations, choices, settings: opening.settings, land, sightTables });
      show({ ask, choices, solution });
    } catch (error) {
      reportFailure(question.ask, error);
    }
  };
}

function reportFailure(ask: number, error: unknown): void {
  report({ kind: "failed", ask, message: error instanceof Error ? error.message : String(error) });
}

function report(message: WorkerReport): void {
  postMessage(message);
}

const work = workOnEvents();
addEventListener("message", (event: MessageEvent<WorkerRequest>) => {
  work(event.data);
});
