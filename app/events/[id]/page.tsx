import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { cache, Suspense } from "react";
import { locateEvent } from "#lib/application/locate-event.ts";
import type { StoredEvent } from "#lib/application/ports.ts";
import { toEstimationSettings } from "#lib/contracts/estimation-settings.ts";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";
import { numberedStations } from "#lib/core/arrival/numbered-stations.ts";
import { withoutStations } from "#lib/core/arrival/without-stations.ts";
import { decodedPart } from "#lib/http/address-part.ts";
import { runningProgram } from "#lib/http/running-program.ts";
import { EventSheet } from "./event-sheet.tsx";
import { viewFromQuery } from "./view.ts";
import text from "../../page-text.module.css";

interface EventAddress {
  readonly params: Promise<{ id: string }>;
  readonly searchParams: Promise<Record<string, string | string[] | undefined>>;
}

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

  const ids = numberedStations(event.observations).map(({ id }) => id);
  const { without } = viewFromQuery(toQuery(await searchParams), ids);
  // What is known to exist is promised before it is worked out; what does not exist has been answered 404 above.
  return (
    <Suspense fallback={<Working />}>
      <LocatedEvent event={event} without={without} />
    </Suspense>
  );
}

async function LocatedEvent({ event, without }: { event: StoredEvent; without: readonly string[] }) {
  const { id, title, note, observations } = event;
  const { host, localizations } = await runningProgram();
  const kept = await localizations.listLocalizations(id);
  const settings = DEFAULT_PUBLIC_SETTINGS;
  const { solution } = locateEvent({ observations: withoutStations(observations, without), settings, host });
  return <EventSheet {...{ id, title, note, observations, solution, without, kept }} settings={toEstimationSettings(settings)} />;
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
