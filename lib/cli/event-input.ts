import { readSettings } from "#lib/contracts/settings.ts";
import type { PublicSettings } from "#lib/contracts/settings.ts";
import type { EventObservations } from "#lib/core/arrival/observations.ts";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { InputIssue } from "#lib/core/failures/input-error.ts";
import { readEventFiles } from "#lib/records/event-files.ts";
import type { TextFile } from "#lib/records/event-files.ts";
import type { Note } from "#lib/records/note.ts";
import { readJsonFile, readTextFile } from "./input-files.ts";
import type { VerbRun } from "./verb.ts";

export interface EventInput {
  readonly observations: EventObservations;
  readonly notes: readonly Note[];
  readonly settings: PublicSettings;
}

/**
 * What the files of a call hold: one event's observations and the settings to use.
 *
 * @throws InputError with the problems of all of them.
 */
export function readEventInput({ call, folder }: Pick<VerbRun, "call" | "folder">): EventInput {
  const issues: InputIssue[] = [];
  const settingsPath = call.named.get("settings");
  const settings = gathering(issues, () =>
    settingsPath === undefined ? readSettings({}) : readSettings(readJsonFile({ path: settingsPath, folder }), settingsPath),
  );
  const file = (option: string): TextFile | null => {
    const path = call.named.get(option);
    return path === undefined ? null : gathering(issues, () => readTextFile({ path, folder }));
  };
  const files = { stations: file("stations"), readings: file("readings"), arrivals: file("arrivals") };
  const event = gathering(issues, () => readEventFiles(files));
  if (settings === null || event === null || issues.length > 0) throw new InputError(issues);
  return { observations: event.value, notes: event.notes, settings };
}

function gathering<Value>(issues: InputIssue[], read: () => Value): Value | null {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    issues.push(...error.issues);
    return null;
  }
}
