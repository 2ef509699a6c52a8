import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import { createRequire } from "node:module";
import { dirname, join } from "node:path";
import { pathToFileURL } from "node:url";

const ENTRY = join("lib", "cli", "main.ts");
const KEPT_IN = join("node_modules", ".cache", "offing");
const MILLISECONDS_PER_DAY = 86_400_000;

/**
 * What lib/cli/main.ts exports. The command's own files and those of its packages are some 800, and reading them one
 * by one takes as long as the answer does. So the first call joins them into one file among the installed packages,
 * which is made anew when a source or the lock file has changed. Where nothing can be kept there (a folder that may
 * not be written), the sources are read as they stand.
 */
export async function loadCommand(packageRoot) {
  const file = join(packageRoot, KEPT_IN, `${digestOf(packageRoot)}.cjs`);
  if (existsSync(file) || (await joined({ packageRoot, file }))) return createRequire(file)(file);
  const { register } = await import("tsx/esm/api");
  register();
  return import(pathToFileURL(join(packageRoot, ENTRY)).href);
}

/** Of every source that the command may be made of, and of what is installed beside them. */
function digestOf(packageRoot) {
  const digest = createHash("sha256").update(process.version);
  const sources = readdirSync(join(packageRoot, "lib"), { recursive: true, encoding: "utf8" })
    .filter((name) => name.endsWith(".ts") && !name.startsWith("store"))
    .map((name) => join("lib", name))
    .sort();
  for (const name of ["package.json", "package-lock.json", ...sources]) {
    digest.update(`\n${name}\n`).update(readFileSync(join(packageRoot, name)));
  }
  return digest.digest("hex").slice(0, 32);
}

/** Whether the one file could be made. It appears whole, whoever else is making it at the same time. */
async function joined({ packageRoot, file }) {
  const { buildSync } = await import("esbuild");
  const unfinished = `${file}.${process.pid}`;
  try {
    mkdirSync(dirname(file), { recursive: true });
    // Claims the place first: there is no use in joining what cannot be kept.
    writeFileSync(unfinished, "");
  } catch {
    return false;
  }
  try {
    buildSync({
      ...{ entryPoints: [join(packageRoot, ENTRY)], outfile: unfinished, allowOverwrite: true, absWorkingDir: packageRoot },
      ...{ bundle: true, platform: "node", format: "cjs", target: "node20", logLevel: "silent", legalComments: "none" },
    });
    renameSync(unfinished, file);
    forgetOthers(file);
    return true;
  } finally {
    rmSync(unfinished, { force: true });
  }
}

/**
 * Files joined from earlier sources, and what calls that were ended left unfinished, once they are a day old. Younger
 * ones may be another call's, which found them and has yet to read them.
 */
function forgetOthers(file) {
  const folder = dirname(file);
  const others = readdirSync(folder).map((name) => join(folder, name)).filter((path) => path !== file);
  for (const path of others) {
    const made = statSync(path, { throwIfNoEntry: false })?.mtimeMs ?? Infinity;
    if (made < Date.now() - MILLISECONDS_PER_DAY) rmSync(path, { force: true });
  }
}
