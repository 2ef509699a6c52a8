import { parseArgs } from "node:util";
import { InputError } from "#lib/core/failures/input-error.ts";

/** The options of a call: files and folders by name, and the two switches that every verb has. */
export interface Call {
  readonly json: boolean;
  readonly help: boolean;
  /** By option name without its dashes. */
  readonly named: ReadonlyMap<string, string>;
}

/**
 * What stands after the verb. Every option may be given once; nothing else may stand there.
 *
 * @throws InputError for options that the verb does not have, lacks a value for, or was given twice.
 */
export function readCall({ verb, args, names }: { readonly verb: string; readonly args: readonly string[]; readonly names: readonly string[] }): Call {
  const values = parse(verb, args, names);
  const named = new Map<string, string>();
  for (const name of names) {
    const given = values[name];
    if (!Array.isArray(given)) continue;
    const [value = "", ...others] = given.map(String);
    if (others.length > 0) throw wrongCall(verb, `--${name} is given ${given.length} times; wanted once`);
    if (value === "") throw wrongCall(verb, `--${name} is given nothing; wanted a file`);
    named.set(name, value);
  }
  return { json: values.json === true, help: values.help === true, named };
}

export function wrongCall(verb: string, what: string): InputError {
  const message = `offing ${verb}: ${what}. See: offing ${verb} --help`;
  return new InputError([{ code: "wrong-call", path: verb, message }]);
}

function parse(verb: string, args: readonly string[], names: readonly string[]) {
  const files = Object.fromEntries(names.map((name) => [name, { type: "string", multiple: true } as const]));
  const options = { ...files, json: { type: "boolean" }, help: { type: "boolean", short: "h" } } as const;
  try {
    return parseArgs({ args: [...args], options, strict: true, allowPositionals: false }).values as Record<string, unknown>;
  } catch (error) {
    if (!(error instanceof TypeError) || !("code" in error)) throw error;
    // Only the first sentence says what is wrong; the rest is advice for programmers.
    const [first = error.message] = error.message.split(/\.\s|\n/);
    throw wrongCall(verb, first.replace(/\.$/, ""));
  }
}
