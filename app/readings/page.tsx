import type { Metadata } from "next";
import { runningProgram } from "#lib/http/running-program.ts";
import { LoadedOnDevice } from "./loaded-on-device.tsx";

export const metadata: Metadata = { title: "Hand readings" };

export default async function HandReadingsPage() {
  const { stations, events, storeId } = await runningProgram();
  const [stationList, eventList] = await Promise.all([stations.listStations(), events.listEvents()]);
  const choices = stationList.map(({ id, aliases, deployments, clockCorrections }) => ({
    id,
    name: deployments.at(-1)?.name ?? id,
    aliases: aliases.map(({ scheme, value }) => `${scheme}:${value}`),
    ...{ deployments, clockCorrections },
  }));
  const ownEvents = eventList.map(({ id, title, firstArrivalEpochSeconds }) => ({ id, title, firstArrivalEpochSeconds }));
  return <LoadedOnDevice storeId={storeId} stations={choices} events={ownEvents} />;
}
