import type { Metadata } from "next";
import { runningProgram } from "#lib/http/running-program.ts";
import { registerRow } from "#lib/presentation/register-rows.ts";
import { Register } from "./register.tsx";

export const metadata: Metadata = { title: "Stations" };

export default async function StationsPage() {
  const { stations } = await runningProgram();
  const list = await stations.listStations();
  return <Register rows={list.map(registerRow).filter((row) => row !== null)} />;
}
