import type { Import, SourceFile } from "./source-tree.ts";

const ALPHABET = ["core/failures", "core/units", "core/waves", "core/signal", "core/geodesy", "core/statistics"];
const CORE = [...ALPHABET, "core/arrival", "core/source", "core/scan", "core/onward"];

/** Who may import whom; a room may always import itself. What is missing here may import nothing of ours. */
const MAY_IMPORT: Readonly<Record<string, readonly string[] | undefined>> = {
  "core/failures": [],
  "core/units": ["core/failures"],
  "core/waves": ALPHABET,
  "core/signal": ALPHABET,
  "core/geodesy": ALPHABET,
  "core/statistics": ALPHABET,
  "core/arrival": ALPHABET,
  "core/source": [...ALPHABET, "core/arrival"],
  "core/scan": [...ALPHABET, "core/arrival", "core/source"],
  "core/onward": [...ALPHABET, "core/arrival", "core/source"],
  records: CORE,
  contracts: CORE,
  chart: CORE,
  presentation: CORE,
  application: [...CORE, "records", "contracts"],
  store: [...CORE, "application/ports"],
  jobs: [...CORE, "contracts", "application", "application/ports"],
  http: [...CORE, "contracts", "application", "application/ports", "jobs", "store"],
  cli: [...CORE, "records", "contracts", "presentation", "application", "application/ports", "store"],
  app: [...CORE, "contracts", "chart", "presentation", "application", "application/ports", "http"],
  prisma: [...CORE, "records", "application/ports", "store"],
  proxy: ["http"],
  instrumentation: ["http"],
  config: ["tests"],
  tests: [...CORE, "records", "contracts", "chart", "presentation", "application", "application/ports", "store", "jobs", "http", "cli", "app", "prisma"],
};

/** Packages that only some rooms may import, by the start of their name. */
const KEPT_PACKAGES: readonly { readonly name: RegExp; readonly rooms: readonly string[]; readonly why: string }[] = [
  { name: /^(@prisma\/|prisma\b|better-sqlite3)/, rooms: ["store", "prisma", "tests"], why: "only lib/store speaks to the database" },
  { name: /^(leaflet|react-leaflet)/, rooms: ["chart", "app", "tests"], why: "the map belongs to the chart and its page" },
  { name: /^(react|react-dom|next)\b/, rooms: ["app", "http", "proxy", "tests"], why: "pages are the only place with React and Next" },
  { name: /^@turf\//, rooms: ["chart", "tests"], why: "shapes for the map are made in the chart" },
  {
    name: /^node:/,
    rooms: ["records", "application", "store", "jobs", "http", "cli", "prisma", "config", "tests", "app"],
    why: "it has to run in a browser",
  },
];

/** The only packages that the science leans on. */
const CORE_PACKAGES = /^(@stdlib\/|geographiclib-geodesic$|geojson$|h3-js$|topojson-client$|topojson-specification$|d3-geo(-projection)?$|\.)/;

/** What code that is sent to a browser may reach. */
const BROWSER_ROOMS = new Set([...CORE, "contracts", "presentation", "chart", "app"]);

function roomOf(path: string): string {
  if (path.startsWith("lib/store/generated/")) return "store";
  if (path === "lib/application/ports.ts") return "application/ports";
  const [top = "", second = "", third = ""] = path.split("/");
  if (top === "lib") return second === "core" ? `core/${third}` : second;
  if (top === "proxy.ts") return "proxy";
  if (top === "instrumentation.ts") return "instrumentation";
  return top === ".config" || top === "next.config.js" ? "config" : top;
}

/** One sentence for each import that the table forbids. */
export function forbiddenImports(file: SourceFile): string[] {
  const room = roomOf(file.path);
  return file.imports.flatMap((item) => {
    const reason = item.path === null ? packageReason(room, item) : ownReason(room, item.path);
    return reason === null ? [] : [`${file.path} imports ${item.specifier}: ${reason}`];
  });
}

function ownReason(room: string, path: string): string | null {
  const target = roomOf(path);
  // The ports are part of the application, and all of them that others see.
  const own = room === target || (room === "application" && target === "application/ports");
  const isAllowed = own || (MAY_IMPORT[room === "application/ports" ? "application" : room] ?? []).includes(target);
  return isAllowed ? null : `${room} may not reach ${target}`;
}

function packageReason(room: string, { specifier }: Import): string | null {
  if (room.startsWith("core/") && !CORE_PACKAGES.test(specifier)) return "the science leans on no such package";
  const kept = KEPT_PACKAGES.find((rule) => rule.name.test(specifier));
  return kept === undefined || kept.rooms.includes(room) ? null : kept.why;
}

/** One sentence for each import by which code for the browser reaches what must stay on the server. */
export function browserLeaks(files: readonly SourceFile[]): string[] {
  const byPath = new Map(files.map((file) => [file.path, file]));
  const roots = files.filter((file) => file.path.startsWith("app/")).flatMap((file) => [...(file.isClient ? [file.path] : []), ...file.workers]);
  const seen = new Set<string>();
  const leaks: string[] = [];
  const queue = [...new Set(roots)];
  for (let path = queue.pop(); path !== undefined; path = queue.pop()) {
    const file = byPath.get(path);
    if (file === undefined || seen.has(path)) continue;
    seen.add(path);
    for (const item of file.imports.filter((candidate) => !candidate.isTypeOnly)) {
      const isServers = item.path === null ? item.specifier.startsWith("node:") : !BROWSER_ROOMS.has(roomOf(item.path));
      if (isServers) leaks.push(`${path} runs in the browser and imports ${item.specifier}`);
      else if (item.path !== null) queue.push(item.path);
    }
  }
  return leaks.sort();
}

/** Each ring of files that import one another, as `a -> b -> a`. Types alone make no ring: they are gone when it runs. */
export function importCycles(files: readonly SourceFile[]): string[] {
  const byPath = new Map(files.map((file) => [file.path, file]));
  const finished = new Set<string>();
  const cycles: string[] = [];
  const visit = (path: string, trail: readonly string[]): void => {
    if (trail.includes(path)) {
      cycles.push([...trail.slice(trail.indexOf(path)), path].join(" -> "));
      return;
    }
    if (finished.has(path)) return;
    for (const item of byPath.get(path)?.imports ?? []) {
      if (item.path !== null && !item.isTypeOnly) visit(item.path, [...trail, path]);
    }
    finished.add(path);
  };
  for (const file of files) visit(file.path, []);
  return cycles;
}
