import Link from "next/link";
import type { EventSummary } from "#lib/application/ports.ts";
import { runningProgram } from "#lib/http/running-program.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import { dayWords } from "#lib/presentation/times.ts";
import text from "./page-text.module.css";

export default async function EventsPage() {
  const { events } = await runningProgram();
  const list = await events.listEvents();
  return (
    <div className={text.page}>
      <h1 className={text.title}>Events</h1>
      <p className={text.lead}>
        {list.length === 0
          ? "No event is stored yet. An event is one storm’s swell at all the stations that heard it."
          : "One storm’s swell at all the stations that heard it, latest first."}
      </p>
      {list.length > 0 && (
        <ol className={text.list}>
          {list.map((event) => (
            <li key={event.id} className={text.entry}>
              <h2 className={text.entryTitle}>
                <Link href={`/events/${encodeURIComponent(event.id)}`}>{event.title}</Link>
              </h2>
              <p>{heardWords(event)}</p>
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
