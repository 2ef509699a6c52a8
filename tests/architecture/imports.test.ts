import { describe, expect, test } from "vitest";
import { browserLeaks, forbiddenImports, importCycles } from "#tests/support/import-rules.ts";
import { parseSource, readSourceTree } from "#tests/support/source-tree.ts";

const files = readSourceTree();

describe("imports", () => {
  test("go only where DEVELOPERS.md lets them", () => {
    expect(files.length).toBeGreaterThan(50);
    expect(files.flatMap(forbiddenImports)).toStrictEqual([]);
  });

  test("of code that runs in the browser never reach the server's rooms", () => {
    expect(browserLeaks(files)).toStrictEqual([]);
  });

  test("make no rings", () => {
    expect(importCycles(files)).toStrictEqual([]);
  });
});

describe("the rules themselves", () => {
  const forbidden: [string, string][] = [
    ["lib/core/waves/x.ts", 'import { f } from "#lib/core/arrival/y.ts";'],
    ["lib/core/units/x.ts", 'import { f } from "../waves/y.ts";'],
    ["lib/core/arrival/x.ts", 'export { f } from "../source/y.ts";'],
    ["lib/core/source/x.ts", 'import { z } from "zod";'],
    ["lib/core/source/x.ts", 'import { readFileSync } from "node:fs";'],
    ["lib/records/x.ts", 'import type { T } from "#lib/application/y.ts";'],
    ["lib/contracts/x.ts", 'import { readFileSync } from "node:fs";'],
    ["lib/application/x.ts", 'import { openStore } from "#lib/store/open-store.ts";'],
    ["lib/application/x.ts", 'import { PrismaClient } from "@prisma/client";'],
    ["lib/store/x.ts", 'import { locateEvent } from "#lib/application/locate-event.ts";'],
    ["lib/presentation/x.ts", 'const f = await import("#lib/http/y.ts");'],
    ["lib/cli/x.ts", 'import L from "leaflet";'],
    ["app/x.tsx", 'import { openStore } from "#lib/store/open-store.ts";'],
    ["app/x.tsx", 'import Database from "better-sqlite3";'],
    ["lib/http/x.ts", 'import { f } from "#tests/support/y.ts";'],
  ];
  test.each(forbidden)("name an import that goes astray: %s %s", (path, text) => {
    expect(forbiddenImports(parseSource(path, text))).toHaveLength(1);
  });

  const allowed: [string, string][] = [
    ["lib/core/source/x.ts", 'import { f } from "../arrival/y.ts"; import type { MultiPolygon } from "geojson";'],
    ["lib/store/x.ts", 'import type { EventStore } from "#lib/application/ports.ts"; import { z } from "zod";'],
    ["lib/application/x.ts", 'import type { EventStore } from "./ports.ts";'],
    ["app/x.tsx", 'import { f } from "#lib/http/y.ts"; import { g } from "./_components/z.tsx";'],
  ];
  test.each(allowed)("let the others pass: %s %s", (path, text) => {
    expect(forbiddenImports(parseSource(path, text))).toStrictEqual([]);
  });

  test("follow a page's code through other files and into its worker", () => {
    const page = parseSource("app/page.tsx", '"use client"; import { f } from "./f.ts"; new Worker(new URL("./w.ts", import.meta.url));');
    const between = parseSource("app/f.ts", 'import { g } from "#lib/application/g.ts"; import type { T } from "#lib/application/t.ts";');
    const worker = parseSource("app/w.ts", 'import { readFileSync } from "node:fs";');
    const server = parseSource("app/layout.tsx", 'import { h } from "#lib/http/h.ts";');
    expect(browserLeaks([page, between, worker, server])).toStrictEqual([
      "app/f.ts runs in the browser and imports #lib/application/g.ts",
      "app/w.ts runs in the browser and imports node:fs",
    ]);
  });

  test("see a ring", () => {
    const ring = [parseSource("lib/a.ts", 'import "./b.ts";'), parseSource("lib/b.ts", 'import "./c.ts";'), parseSource("lib/c.ts", 'import "./a.ts";')];
    expect(importCycles(ring)).toStrictEqual(["lib/a.ts -> lib/b.ts -> lib/c.ts -> lib/a.ts"]);
  });
});
