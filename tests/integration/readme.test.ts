import { readdirSync, readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { DEFAULT_PUBLIC_SETTINGS } from "#lib/contracts/settings.ts";
import { workedCalls } from "#tests/support/readme-calls.ts";

const README = readFileSync("README.md", "utf8");

test("the worked calls of README.md print what it says they print; npm run readme:calls writes them anew", () => {
  const calls = workedCalls(README);
  expect(calls.map(({ args }) => args[0])).toStrictEqual(["fit", "locate"]);
  for (const { said, printed } of calls) expect(said).toBe(printed);
});

test("README.md names every script that a reader is sent to, and every setting", () => {
  const { scripts } = JSON.parse(readFileSync("package.json", "utf8")) as { scripts: Record<string, string> };
  const sentTo = [...README.matchAll(/npm (?:run )?(?:--silent )?(demo|test|start|build|intake|bench|offing)\b/g)].map(([, name = ""]) => name);
  expect(new Set(sentTo)).toStrictEqual(new Set(["demo", "test", "start", "build", "intake", "bench", "offing"]));
  for (const name of sentTo) expect(scripts).toHaveProperty(name);
  const settings = Object.entries(DEFAULT_PUBLIC_SETTINGS).flatMap(([key, value]) =>
    typeof value === "object" ? Object.keys(value).map((inner) => `\`${key}.${inner}\``) : [`\`${key}\``],
  );
  expect(settings).toHaveLength(13);
  for (const name of settings) expect(README).toContain(name);
});

test("DEVELOPERS.md names only files, scripts and packages that exist, and every package", () => {
  const paper = readFileSync("DEVELOPERS.md", "utf8");
  const manifest = JSON.parse(readFileSync("package.json", "utf8")) as Record<"scripts" | "dependencies" | "devDependencies", Record<string, string>>;
  const files = ["app", "lib", "prisma", "tests", "fixtures", ".ci"].flatMap((room) =>
    readdirSync(room, { recursive: true, encoding: "utf8" }).map((name) => `/${room}/${name}`),
  );
  const known = [...files, ...readdirSync(".").map((name) => `/${name}`)];
  const named = [...paper.matchAll(/`([\w./[\]-]+\.(?:tsx?|mjs|sql|css|json|prisma|md))`/g)].map(([, name = ""]) => name).filter((name) => !name.includes("NNNN") && !name.startsWith("tests/output"));
  expect(named.length).toBeGreaterThan(40);
  expect(named.filter((name) => !known.some((path) => path.endsWith(`/${name}`)))).toStrictEqual([]);

  const scripts = [...paper.matchAll(/npm run ([\w:]+)/g)].map(([, name = ""]) => name);
  expect(scripts.filter((name) => !(name in manifest.scripts))).toStrictEqual([]);
  const packages = Object.keys({ ...manifest.dependencies, ...manifest.devDependencies }).filter((name) => !name.startsWith("@types/"));
  expect(packages.filter((name) => !paper.includes(`\`${name}\``) && !name.startsWith("@stdlib/stats-base-dists-"))).toStrictEqual([]);
});
