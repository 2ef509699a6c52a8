import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { breachesOf } from "#tests/support/manner-rules.ts";
import { parseSource, readSourceTree } from "#tests/support/source-tree.ts";

describe("the code", () => {
  const files = readSourceTree();

  test("keeps the manners of DEVELOPERS.md", () => {
    expect(files.length).toBeGreaterThan(50);
    expect(files.flatMap(breachesOf)).toStrictEqual([]);
  });

  test("has no test that is skipped, singled out or put off", () => {
    const escapes = files
      .filter(({ path }) => path.endsWith(".test.ts"))
      .filter(({ tree }) => /\b(test|it|describe)\.(skip|only|todo|fails|skipIf|runIf)\b/.test(tree.text))
      .filter(({ path }) => path !== "tests/architecture/manners.test.ts");
    expect(escapes.map(({ path }) => path)).toStrictEqual([]);
  });

  test("compares decimals in tests by expectWithin alone", () => {
    const word = ["to", "BeCloseTo"].join("");
    expect(files.filter(({ tree }) => tree.text.includes(word)).map(({ path }) => path)).toStrictEqual([]);
  });
});

describe("the top of the house", () => {
  test("holds what was decided and what tools demand, and nothing else", () => {
    const decided = ["package.json", "next.config.js", "tsconfig.json", "README.md", "DEVELOPERS.md", "app", "lib", "prisma", "tests", "fixtures"];
    // The lock file; the folder that Next serves as it stands; the files that Next takes for its proxy and for what it runs first; types and
    // records that tools leave behind, which are not kept.
    const demanded = ["package-lock.json", "public", "proxy.ts", "instrumentation.ts", "node_modules", "next-env.d.ts", "tsconfig.tsbuildinfo"];
    const others = readdirSync(".").filter((name) => !name.startsWith(".") && ![...decided, ...demanded].includes(name));
    expect(others).toStrictEqual([]);
  });

  test("keeps no download address in its lock file", () => {
    const lock = readFileSync("package-lock.json", "utf8");
    expect(lock).toContain('"lockfileVersion"');
    expect(lock).not.toContain('"resolved"');
  });
});

describe("the rules themselves", () => {
  const breaches: [string, string, string][] = [
    ["lib/core/waves/x.ts", "let total = 0;", "module state"],
    ["lib/core/waves/x.ts", "const seen = new Map<string, number>();", "module state"],
    ["lib/core/waves/x.ts", "export const f = () => Date.now();", "Date.now"],
    ["lib/core/waves/x.ts", "export const f = () => new Date();", "new Date()"],
    ["lib/core/waves/x.ts", "export const f = () => Math.random();", "Math.random"],
    ["lib/core/waves/x.ts", "export const f = () => process.env;", "process.env"],
    ["lib/core/waves/x.ts", "export const f = async () => 1;", "asynchronous"],
    ["lib/core/waves/x.ts", "//\n".repeat(201), "201 lines"],
    ["lib/chart/x.ts", "export const f = (a: any) => 1;", "any"],
    ["lib/chart/x.ts", "export const f = (a: number[]) => a[0]!;", "non-null"],
    ["lib/chart/x.ts", "export default 1;", "default export"],
    ["lib/chart/x.ts", "export default function f() {}", "default export"],
    ["lib/chart/x.ts", "export class Thing {}", "class"],
    ["lib/chart/geo-utils.ts", "export const a = 1;", "named after no idea"],
    ["lib/chart/x.ts", 'import { a } from "./y";', "without its extension"],
    ["app/x.tsx", "type A = LatLngTuple;", "pairs belong"],
  ];
  test.each(breaches)("name a breach in %s (%#)", (path, text, word) => {
    const found = breachesOf(parseSource(path, text));
    expect(found).toHaveLength(1);
    expect(found[0]).toContain(word);
  });

  test("let good manners pass", () => {
    const text = "const UNITS = new Map([['km', 1000]]); export const f = (at: number) => new Date(at); export class OddError extends Error {}";
    expect(breachesOf(parseSource("lib/core/waves/x.ts", text))).toStrictEqual([]);
    expect(breachesOf(parseSource("app/events/page.tsx", "export default function Page() { return null; }"))).toStrictEqual([]);
  });
});
