import { useState } from "react";
import type { Draft, DraftRow } from "#lib/contracts/hand-readings/draft.ts";
import { isBlank, type ReadRow, type RowIssue } from "#lib/contracts/hand-readings/hand-row.ts";
import { DEFAULT_SETTINGS } from "#lib/core/source/settings.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import type { Bringing } from "./bring-in.ts";
import type { DraftChange } from "./draft-changes.ts";
import type { EventChoice } from "./keep-part.tsx";
import type { StationChoice } from "./station-choice.ts";
import type { LeftFields } from "./use-left-fields.ts";
import { useKeeping, type Keeping } from "./use-keeping.ts";
import { workOut, type WorkedOut } from "./work-out.ts";

const MOST_TITLE_LETTERS = 200;

/** Brings the form's readings in once all of it is right, and says beside each field what is not. */
export function useBringingIn(given: {
  draft: Draft;
  change: (change: DraftChange) => void;
  left: LeftFields;
  stations: readonly StationChoice[];
  events: readonly EventChoice[];
}) {
  const { draft, left } = given;
  const keeping = useKeeping();
  // What was made here is added here. Asking for the page anew, once its address has changed, would make the form anew as well.
  const [made, setMade] = useState<{ stations: readonly StationChoice[]; events: readonly EventChoice[] }>({ stations: [], events: [] });
  const stations = joined(given.stations, made.stations);
  const events = joined(given.events, made.events);
  const change = (one: DraftChange): void => { given.change(one); };
  const faults = faultsOf(draft, stations, events);

  const bringIn = async (): Promise<void> => {
    left.showAll();
    const work = workOut(draft, stations, DEFAULT_SETTINGS);
    const bringing = bringingOf(draft, work, faults);
    if (bringing === null) {
      keeping.hold(work.typed === 0 ? "There is no reading to bring in yet." : "Nothing was sent: something is missing or wrong, and is marked at its field.");
      requestAnimationFrame(() => { document.querySelector<HTMLElement>("form [aria-invalid=true]")?.focus(); });
      return;
    }
    const keys = draft.rows.filter((_, i) => work.reads[i]?.reading).map(({ key }) => key);
    const name = work.mark?.name ?? bringing.stationId;
    const eventTitle = events.find(({ id }) => id === draft.keep.event)?.title ?? draft.keep.event;
    const outcome = await keeping.start(bringing, keys, { done: `${counted(bringing.readings.length, "reading")} of ${name} ${bringing.readings.length === 1 ? "is" : "are"} in${draft.keep.way === "waiting" ? ", and wait for an event" : ""}.`, eventTitle });
    if (outcome === null) return;
    const { placed } = bringing;
    const first = Math.min(...bringing.readings.map(({ time }) => Date.parse(time) / 1000));
    setMade((before) => ({
      stations: placed === null ? before.stations : [...before.stations, { id: placed.stationId, name: placed.name, aliases: [], deployments: [placed], clockCorrections: [] }],
      events: draft.keep.way !== "new" || outcome.event === null ? before.events : [...before.events, { ...outcome.event, firstArrivalEpochSeconds: first }],
    }));
    left.forget();
    change({ kind: "next", event: outcome.event?.id ?? null });
    requestAnimationFrame(() => { document.querySelector<HTMLElement>("form fieldset input:not([type=radio])")?.focus(); });
  };
  return {
    ...{ stations, events, keeping: keeping as Keeping & { forget: () => void } },
    stationMessage: (left.isShown("station") || draft.station.id !== "" ? faults.station : null) ?? keeping.refused.station,
    titleMessage: (left.isShown("title") ? faults.title : null) ?? keeping.refused.title,
    eventMessage: (left.isShown("event") ? faults.event : null) ?? keeping.refused.event,
    rowIssues: (row: DraftRow, read: ReadRow): readonly RowIssue[] => {
      // A row that is blank but for its date is no reading, and yet a date that is none is told.
      const told = isBlank(row) ? read.issues.filter(({ field }) => field === "date" && row.date.trim() !== "") : read.issues;
      const own = told.filter(({ field }) => left.isShown(`${row.key}-${field}`));
      return [...own, ...keeping.refused.rows.filter(({ key, field }) => key === row.key && own.every((issue) => issue.field !== field))];
    },
    bringIn: () => { void bringIn(); },
  };
}

interface Faults {
  readonly station: string | null;
  readonly title: string | null;
  readonly event: string | null;
}

function faultsOf({ station, keep }: Draft, stations: readonly StationChoice[], events: readonly EventChoice[]): Faults {
  const title = keep.title.trim();
  return {
    station: station.way === "stored" && stations.every(({ id }) => id !== station.id) ? (station.id === "" ? "Choose the station, or place a new one." : `No station “${station.id}” is stored.`) : null,
    title: keep.way === "new" && (title === "" || title.length > MOST_TITLE_LETTERS) ? `Give the event a title of 1 to ${MOST_TITLE_LETTERS} letters.` : null,
    event: keep.way === "event" && events.every(({ id }) => id !== keep.event) ? "Choose the event that the readings belong to." : null,
  };
}

/** Null while anything is missing or wrong. */
function bringingOf(draft: Draft, { chosen, placed, reads, readings }: WorkedOut, faults: Faults): Bringing | null {
  const isNew = draft.station.way === "new";
  const isWrong = draft.rows.some((row, i) => !isBlank(row) && reads[i]?.reading === null);
  if (isWrong || readings.length === 0 || Object.values(faults).some((fault) => fault !== null)) return null;
  if (isNew ? placed.deployment === null : chosen === null) return null;
  const { note, keep } = draft;
  return {
    stationId: chosen?.id ?? placed.deployment?.stationId ?? "",
    placed: isNew ? placed.deployment : null,
    readings: readings.map(({ reading }) => reading),
    ...{ note, keep },
  };
}

function joined<Item extends { readonly id: string }>(listed: readonly Item[], made: readonly Item[]): readonly Item[] {
  return [...listed, ...made.filter(({ id }) => listed.every((item) => item.id !== id))];
}
