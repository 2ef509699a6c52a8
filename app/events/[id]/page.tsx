import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { cache, Suspense } from "react";
import { locateEvent } from "#lib/application/locate-event.ts";
import type { LocalizationSummary, StoredEvent } from "#lib/application/ports.ts";
import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import { readSettings } from "#lib/contracts/settings.ts";
import { chosenObservations } from "#lib/core/arrival/chosen-observations.ts";
import { gatheringNotes } from "#lib/core/arrival/gathering-notes.ts";
import { knownChoices } from "#lib/core/arrival/known-choices.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import { NO_CHOICES } from "#lib/core/arrival/observation-choices.ts";
import { decodedPart } from "#lib/http/address-part.ts";
import { runningProgram } from "#lib/http/running-program.ts";
import { keptWords } from "#lib/presentation/kept-words.ts";
import { EventSheet } from "./event-sheet.tsx";
import { viewFromQuery } from "./view.ts";
import text from "../../page-text.module.css";

interface EventAddress {
  readonly params: Promise<{ id: string }>;
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>;
}

const AUDIT_LINES = 200;

/** By its id as the address writes it. The head and the body of the page ask for the same event: it is loaded once. */
const loadEvent = cache(async (written: string): Promise<StoredEvent | null> => {
  const id = decodedPart(written);
  if (id === null) return null;
  const { events } = await runningProgram();
  return events.loadEvent(id);
});

export async function generateMetadata({ params }: EventAddress): Promise<Metadata> {
  const event = await loadEvent((await params).id);
  return { title: event?.title ?? "No such event" };
}

export default async function EventPage({ params, searchParams }: EventAddress) {
  const event = await loadEvent((await params).id);
  if (event === null) notFound();
  const { localizations } = await runningProgram();
  const kept = await localizations.listLocalizations(event.id);
  if (event.arrivals.length === 0) return <EmptyEvent event={event} kept={kept} />;

  // What is known to exist is promised before it is worked out; what does not exist has been answered 404 above.
  return (
    <Suspense fallback={<Working />}>
      <LocatedEvent event={event} kept={kept} query={toQuery(await searchParams)} />
    </Suspense>
  );
}

async function LocatedEvent({ event, kept, query }: { event: StoredEvent; kept: readonly LocalizationSummary[]; query: URLSearchParams }) {
  const { id, title, note, revision, arrivals, observations } = event;
  const { host, audit, storeId } = await runningProgram();
  const [latest] = kept;
  const base = knownChoices(latest?.choices ?? NO_CHOICES, observations);
  const settings = readSettings(latest === undefined ? {} : JSON.parse(latest.settingsJson));
  const knownIds = numberedStations(observations).map((station) => station.id);
  const { without } = viewFromQuery(query, { knownIds, without: base.leftOutStationIds });
  const choices = { ...base, leftOutStationIds: without };
  const { solution } = locateEvent({ observations: chosenObservations(observations, choices), settings, host });
  const withNotes = { ...solution, warnings: [...gatheringNotes(observations, choices), ...solution.warnings] };
  const trail = await audit.listAudit({ subject: `event ${id}`, limit: AUDIT_LINES });
  return (
    <EventSheet
      key={revision}
      event={{ id, title, note, revision }}
      solution={withNotes}
      settings={toEstimationSettings(settings)}
      settingsJson={JSON.stringify(settings)}
      {...{ storeId, arrivals, observations, choices, base, kept, trail }}
    />
  );
}

/** One that was merged into another, or that nothing was brought in for yet. */
function EmptyEvent({ event, kept }: { event: StoredEvent; kept: readonly LocalizationSummary[] }) {
  const { id, title, note, mergedInto } = event;
  return (
    <div className={text.page}>
      <h1 className={text.title}>{title}</h1>
      {note !== "" && <p className={text.note}>{note}</p>}
      {mergedInto === null ? (
        <p className={text.lead}>
          No arrival is in this event yet. <Link href={`/readings?event=${encodeURIComponent(id)}`}>Bring in readings timed by hand</Link>, or move an arrival here from another event’s page.
        </p>
      ) : (
        <p className={text.lead}>
          Its arrivals were merged into <Link href={`/events/${encodeURIComponent(mergedInto)}`}>{mergedInto}</Link>.
        </p>
      )}
      {kept.length > 0 && (
        <>
          <h2 className={text.lead}>Answers that were kept of it</h2>
          <ol className={text.list}>
            {kept.map((one) => {
              const { what, who } = keptWords(one, []);
              return <li key={one.number} className={text.entry}>{one.number}: {what}. {who}. {one.reason}</li>;
            })}
          </ol>
        </>
      )}
    </div>
  );
}

function Working() {
  return (
    <div className={text.page} role="status">
      <p className={text.lead}>Working out where the storm was…</p>
    </div>
  );
}

function toQuery(searchParams: Record<string, string | string[] | undefined>): URLSearchParams {
  const query = new URLSearchParams();
  for (const [key, values] of Object.entries(searchParams)) {
    for (const value of [values ?? []].flat()) query.append(key, value);
  }
  return query;
}
