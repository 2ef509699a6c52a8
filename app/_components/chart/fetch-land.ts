import type { GeometryCollection, Topology } from "topojson-specification";

/** Fetched once and apart from the page's own scripts: land is as large as all of them. */
export async function fetchLand(): Promise<Topology<{ land: GeometryCollection }>> {
  const response = await fetch(new URL("world-atlas/land-50m.json", import.meta.url));
  if (!response.ok) throw new Error(`The base map could not be fetched (status ${response.status}).`);
  return (await response.json()) as Topology<{ land: GeometryCollection }>;
}
