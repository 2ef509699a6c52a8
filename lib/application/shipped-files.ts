import { readFileSync } from "node:fs";
import { createRequire } from "node:module";
import { join } from "node:path";
import type { Topology } from "topojson-specification";

/**
 * Files that come with the program. `packageRoot` is the folder of its package.json: the host knows it, since a
 * bundled module no longer stands where its source did.
 */
interface PackageRoot {
  readonly packageRoot: string;
}

/** "offing" and the version, as answers carry it. */
export function readProgramName({ packageRoot }: PackageRoot): string {
  const { name, version } = JSON.parse(readFileSync(join(packageRoot, "package.json"), "utf8")) as { name: string; version: string };
  return `${name} ${version}`;
}

/** Natural Earth's land at 1:50 million. */
export function readLandTopology({ packageRoot }: PackageRoot): Topology {
  const resolver = createRequire(join(packageRoot, "package.json"));
  return JSON.parse(readFileSync(resolver.resolve("world-atlas/land-50m.json"), "utf8")) as Topology;
}
