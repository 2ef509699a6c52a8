import { readProgramName, readLandTopology } from "#lib/application/shipped-files.ts";
import { createLand } from "#lib/application/land.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import { readCall } from "./call.ts";
import type { Verb } from "./verb.ts";
import { fit } from "./verbs/fit.ts";
import { locate } from "./verbs/locate.ts";

export interface CommandLine {
  /** What stands after the program's name. */
  readonly args: readonly string[];
  /** Where relative paths start. */
  readonly folder: string;
  readonly packageRoot: string;
}

/** Exit status 0: an answer; 2: the call or its input is wrong; 1: a fault of the program. */
export interface CommandResult {
  readonly status: 0 | 1 | 2;
  readonly standardOutput: string;
  readonly standardError: string;
}

const VERBS: ReadonlyMap<string, Verb> = new Map([
  ["fit", fit],
  ["locate", locate],
]);
const LATER_VERBS = ["arrivals", "scan", "onward"];

const OVERVIEW = `offing <verb> [options]

Finds the storm behind the swell: several wave stations' arrivals become a place and a time, with their region of
confidence.

${[...VERBS].map(([name, { summary }]) => `  ${name.padEnd(8)} ${summary}`).join("\n")}

offing <verb> --help says what a verb takes.`;

/** One call of the program, from its arguments to what it prints. */
export function runCommand(line: CommandLine): CommandResult {
  try {
    return answer(line);
  } catch (error) {
    if (error instanceof InputError) return { status: 2, standardOutput: "", standardError: `${error.message}\n` };
    const fault = error instanceof Error ? error.message : String(error);
    return { status: 1, standardOutput: "", standardError: `The program met a fault of its own and has no answer: ${fault}\n` };
  }
}

function answer({ args, folder, packageRoot }: CommandLine): CommandResult {
  const [name, ...rest] = args;
  if (name === "--help" || name === "-h") return printed(OVERVIEW);
  if (name === "--version") return printed(readProgramName({ packageRoot }));
  if (name === undefined) return { status: 2, standardOutput: "", standardError: `${OVERVIEW}\n` };
  const verb = VERBS.get(name);
  if (verb === undefined) throw unknownVerb(name);
  const call = readCall({ verb: name, args: rest, names: verb.options });
  if (call.help) return printed(verb.help);
  const land = createLand({ readTopology: () => readLandTopology({ packageRoot }) });
  const { json, text, messages } = verb.run({ call, folder, host: { program: readProgramName({ packageRoot }), land } });
  const standardError = messages.map((message) => `Warning: ${message}\n`).join("");
  return { status: 0, standardOutput: `${call.json ? JSON.stringify(json) : text}\n`, standardError };
}

function printed(text: string): CommandResult {
  return { status: 0, standardOutput: `${text}\n`, standardError: "" };
}

function unknownVerb(name: string): InputError {
  const message = LATER_VERBS.includes(name)
    ? `offing ${name}: not in this version; wanted one of ${[...VERBS.keys()].join(", ")}.`
    : `offing: found ${JSON.stringify(name)}; wanted one of ${[...VERBS.keys()].join(", ")}. See: offing --help`;
  return new InputError([{ code: "unknown-verb", path: name, message }]);
}
