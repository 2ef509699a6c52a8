import { join } from "node:path";
import { runOffing } from "./run-offing.ts";

const CALL = /(```sh\nnpm run --silent offing -- (.+)\n```\n\n```text\n)([^`]*)```/g;

/** A worked call of a paper: what it is given, what the paper says it prints, and what it does print. */
export interface WorkedCall {
  readonly args: readonly string[];
  readonly said: string;
  readonly printed: string;
}

export function workedCalls(paper: string): WorkedCall[] {
  return [...paper.matchAll(CALL)].map(([, , args = "", said = ""]) => ({ args: args.split(" "), said, printed: printedBy(args) }));
}

/** The paper with what its calls do print. */
export function withPrinted(paper: string): string {
  return paper.replaceAll(CALL, (_, call: string, args: string) => `${call}${printedBy(args)}\`\`\``);
}

function printedBy(args: string): string {
  const fromHere = args.split(" ").map((word) => (word.startsWith("fixtures/") ? join(process.cwd(), word) : word));
  return runOffing({ args: fromHere }).out;
}
