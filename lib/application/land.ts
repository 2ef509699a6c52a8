import type { Topology } from "topojson-specification";
import { buildLandMask } from "#lib/core/geodesy/land-mask.ts";
import type { LandMask } from "#lib/core/geodesy/land-mask.ts";
import { buildSightTable } from "#lib/core/geodesy/build-sight-table.ts";
import type { SightTable } from "#lib/core/geodesy/sight-table.ts";
import type { Position } from "#lib/core/units/position.ts";

/** Where land lies and what a station sees past it; each worked out when first asked for, then kept. */
export interface Land {
  readonly mask: () => LandMask;
  readonly sightFrom: (station: Position) => SightTable;
}

/** A host makes one and hands it to every use case, so that the world is read once. */
export function createLand({ readTopology }: { readonly readTopology: () => Topology }): Land {
  const masks: LandMask[] = [];
  const tables = new Map<string, SightTable>();
  const mask = (): LandMask => {
    const built = masks[0] ?? buildLandMask(readTopology());
    masks[0] = built;
    return built;
  };
  const sightFrom = (station: Position): SightTable => {
    const key = `${station.latitudeDegrees} ${station.longitudeDegrees}`;
    const table = tables.get(key) ?? buildSightTable({ station, land: mask() });
    tables.set(key, table);
    return table;
  };
  return { mask, sightFrom };
}
