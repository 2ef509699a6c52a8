import { spawnSync } from "node:child_process";

export interface FamilyMember {
  readonly id: number;
  readonly megabytes: number;
}

/** A process of this machine with all that it started and that those did. */
export function processFamily(processId: number): FamilyMember[] {
  const { stdout } = spawnSync("ps", ["-eo", "pid=,ppid=,rss="], { encoding: "utf8" });
  const rows = stdout.trim().split("\n").map((line) => line.trim().split(/\s+/).map(Number));
  const ids = new Set([processId]);
  // Parents come to be before their children, but their numbers may have begun anew: so again until nothing is added.
  for (let size = 0; size < ids.size; ) {
    size = ids.size;
    for (const [id = 0, parent = 0] of rows) if (ids.has(parent)) ids.add(id);
  }
  return rows.filter(([id = 0]) => ids.has(id)).map(([id = 0, , kilobytes = 0]) => ({ id, megabytes: kilobytes / 1000 }));
}
