/** The one function used of a package that ships no types. */
declare module "d3-geo-projection" {
  import type { GeoProjection } from "d3-geo";
  import type { Geometry } from "geojson";

  export function geoProject(geometry: Geometry, projection: GeoProjection): Geometry | null;
}
