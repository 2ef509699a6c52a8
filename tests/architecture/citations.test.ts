import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { z } from "zod";

const root = new URL("../..", import.meta.url).pathname;
const read = (path: string) => readFileSync(`${root}${path}`, "utf8");
const filesOf = (folder: string, ending: RegExp) =>
  readdirSync(`${root}${folder}`, { recursive: true, encoding: "utf8" })
    .filter((file) => ending.test(file) && !file.includes("generated/"))
    .map((file) => `${folder}/${file}`);
const bibliography = z.record(z.string(), z.unknown()).parse(JSON.parse(read("fixtures/sources.json")));
const keys = new Set(Object.keys(bibliography).filter((key) => !key.startsWith("_")));

const entry = z.strictObject({
  authors: z.string().optional(),
  year: z.number().int().optional(),
  title: z.string().min(1),
  published: z.string().min(1),
  doi: z.string().optional(),
  note: z.string().optional(),
});

/** Keys cited as `[source: one, another]` or as `@see key` at a line's end. */
function citations(text: string): string[] {
  const listed = [...text.matchAll(/\[source:\s*([^\]]+)\]/g)].flatMap(([, list = ""]) => list.split(/[\s*,]+/));
  const seen = [...text.matchAll(/@see ([a-z][a-z0-9-]*)\s*$/gm)].map(([, key = ""]) => key);
  return [...listed, ...seen].filter((key) => key !== "");
}

describe("the bibliography", () => {
  it.each([...keys])("says what %s is", (key) => {
    expect(entry.safeParse(bibliography[key]).error).toBeUndefined();
  });

  it("holds every source that the code cites", () => {
    const files = filesOf("lib", /\.tsx?$/);
    const cited = files.flatMap((file) => citations(read(file)).map((key) => ({ file, key })));
    expect(cited.length).toBeGreaterThan(10);
    expect(cited.filter(({ key }) => !keys.has(key))).toEqual([]);
  });

  it("holds the source of every table of reference values", () => {
    const files = filesOf("fixtures/reference", /\.json$/);
    const named = z.looseObject({ source: z.string() });
    const sources = files.map((file) => ({ file, key: named.parse(JSON.parse(read(file))).source }));
    expect(sources.length).toBeGreaterThan(0);
    expect(sources.filter(({ key }) => !keys.has(key))).toEqual([]);
  });

  it("reads keys in both forms", () => {
    expect(citations("x [source: a-1, b-2] y\n * [source:\n * c-3]\n * @see d-4\n * @see https://e")).toEqual(["a-1", "b-2", "c-3", "d-4"]);
  });
});
