import Link from "next/link";
import type { EventSummary } from "#lib/application/ports.ts";
import { runningProgram } from "#lib/http/running-program.ts";
import { keptPlaceWords } from "#lib/presentation/kept-words.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import { dayWords } from "#lib/presentation/times.ts";
import { waitingWords } from "#lib/presentation/waiting-words.ts";
import { WaitingArrivals } from "./waiting-arrivals.tsx";
import text from "./page-text.module.css";

const MOST_WAITING = 200;

export default async function EventsPage() {
  const { events, arrivals, stations } = await runningProgram();
  const [list, waiting] = await Promise.all([events.listEvents(), arrivals.listArrivals({ eventId: null, limit: MOST_WAITING })]);
  const names = waiting.length === 0 ? new Map<string, string>() : new Map((await stations.listStations()).map(({ id, deployments }) => [id, deployments.at(-1)?.name ?? id]));
  return (
    <div className={text.page}>
      <h1 className={text.title}>Events</h1>
      <p className={text.lead}>
        {list.length === 0 ? (
          <>
            No event is stored yet. An event is one storm’s swell at all the stations that heard it: begin with{" "}
            <Link href="/readings">readings timed by hand</Link>, or bring in a folder of files as README.md says.
          </>
        ) : (
          "One storm’s swell at all the stations that heard it, latest first."
        )}
      </p>
      {waiting.length > 0 && (
        <WaitingArrivals
          arrivals={waiting.map((arrival) => ({ id: arrival.id, revision: arrival.revision, words: waitingWords(arrival, names.get(arrival.stationId) ?? arrival.stationId) }))}
        />
      )}
      {list.length > 0 && (
        <ol className={text.list}>
          {list.map((event) => (
            <li key={event.id} className={text.entry}>
              <h2 className={text.entryTitle}>
                <Link href={`/events/${encodeURIComponent(event.id)}`} prefetch={false}>{event.title}</Link>
              </h2>
              <p>{heardWords(event)}</p>
              {event.latest !== null && <p>Kept answer {event.latest.number}: {keptPlaceWords(event.latest)}</p>}
              {event.note !== "" && <p className={text.note}>{event.note}</p>}
            </li>
          ))}
        </ol>
      )}
    </div>
  );
}

function heardWords(event: EventSummary): string {
  const first = event.firstArrivalEpochSeconds;
  return [
    ...(first === null ? [] : [`first swell ${dayWords(first)}`]),
    counted(event.stationCount, "station"),
    ...(event.readingCount > 0 ? [counted(event.readingCount, "reading")] : []),
    ...(event.estimateCount > 0 ? [counted(event.estimateCount, "estimate")] : []),
  ].join(" · ");
}
