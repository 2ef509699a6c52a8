import type { Host } from "#lib/application/host.ts";
import type { Call } from "./call.ts";

export interface VerbRun {
  readonly call: Call;
  /** Where the caller's relative paths start. */
  readonly folder: string;
  readonly host: Host;
}

export interface VerbOutput {
  readonly json: unknown;
  /** The same for people. */
  readonly text: string;
  /** Lines for standard error. */
  readonly messages: readonly string[];
}

/** A command: what it is asked, how it explains itself, what it does. */
export interface Verb {
  readonly summary: string;
  readonly help: string;
  /** Options that take a value, without their dashes. */
  readonly options: readonly string[];
  readonly run: (run: VerbRun) => VerbOutput;
}
