import type { Metadata } from "next";
import Link from "next/link";
import { notFound } from "next/navigation";
import { cache } from "react";
import type { StoredStation } from "#lib/application/ports.ts";
import { stationHistory } from "#lib/application/station-history.ts";
import { stationJson } from "#lib/contracts/api/stations.ts";
import { decodedPart } from "#lib/http/address-part.ts";
import { runningProgram } from "#lib/http/running-program.ts";
import { counted } from "#lib/presentation/numbers-in-words.ts";
import { momentWords } from "#lib/presentation/times.ts";
import { RemoveStation } from "../remove-station.tsx";
import { StationForm } from "../station-form.tsx";
import { StationHistory } from "../station-history.tsx";
import styles from "../station-form.module.css";

interface StationAddress {
  readonly params: Promise<{ id: string }>;
}

/** By its id as the address writes it. The head and the body of the page ask for the same station: it is loaded once. */
const loadStation = cache(async (written: string): Promise<StoredStation | null> => {
  const id = decodedPart(written);
  if (id === null) return null;
  const { stations } = await runningProgram();
  return stations.loadStation(id);
});

export async function generateMetadata({ params }: StationAddress): Promise<Metadata> {
  const station = await loadStation((await params).id);
  return { title: station?.deployments.at(-1)?.name ?? "No such station" };
}

export default async function StationPage({ params }: StationAddress) {
  const station = await loadStation((await params).id);
  if (station === null) notFound();
  const { audit } = await runningProgram();
  const { id, revision, arrivalCount, lastReadingEpochSeconds: last } = station;
  return (
    <div className={styles.page}>
      <h1 className={styles.title}>{station.deployments.at(-1)?.name ?? id}</h1>
      <p className={styles.lead}>
        {id} · revision {revision} · {counted(arrivalCount, "arrival")} · {last === null ? "no reading yet" : `last reading ${momentWords(last)}, by its own clock`} · <Link href={`/stations?station=${encodeURIComponent(id)}`}>on the map</Link>
      </p>
      <StationForm key={id} station={stationJson(station)} />
      <StationHistory entries={await stationHistory(audit, id)} />
      <RemoveStation id={id} revision={revision} arrivalCount={arrivalCount} />
    </div>
  );
}
