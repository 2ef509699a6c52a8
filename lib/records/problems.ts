import { InputError } from "#lib/core/failures/input-error.ts";
import type { InputIssue } from "#lib/core/failures/input-error.ts";

/** More would scroll the first ones, which usually explain the rest, out of sight. */
const PROBLEMS_SHOWN = 50;
const FOUND_CHARACTERS_SHOWN = 60;

export interface Problem {
  readonly code: string;
  /** Line number in the file, the header being 1 where nothing stands before it. */
  readonly row?: number;
  readonly column?: string;
  /** The text that stood there. */
  readonly found?: string;
  /** What should stand there, to follow the word "wanted". */
  readonly wanted: string;
}

/** Everything found wrong with one file, gathered so that all of it is told at once. */
export interface Problems {
  readonly add: (problem: Problem) => void;
  /** @throws InputError with the first 50 problems and how many more there were, if there were any. */
  readonly throwIfAny: () => void;
}

export function collectProblems(fileName: string): Problems {
  const shown: InputIssue[] = [];
  const counter = { total: 0 };
  return {
    add(problem) {
      counter.total += 1;
      if (shown.length < PROBLEMS_SHOWN) shown.push(issueOf(fileName, problem));
    },
    throwIfAny() {
      if (counter.total === 0) return;
      const more = counter.total - shown.length;
      if (more === 0) throw new InputError(shown);
      const message = `${fileName}: ${more} more problems like these are not shown (${counter.total} in all).`;
      throw new InputError([...shown, { code: "more-problems", path: fileName, message }]);
    },
  };
}

/** The text of a cell or file as a message shows it: in quotes, control characters spelt out, cut when long. */
export function quoted(text: string): string {
  return JSON.stringify(text.length > FOUND_CHARACTERS_SHOWN ? `${text.slice(0, FOUND_CHARACTERS_SHOWN)}...` : text);
}

function issueOf(fileName: string, problem: Problem): InputIssue {
  const { row, column, found } = problem;
  const place = [fileName];
  if (row !== undefined) place.push(`row ${row}`);
  if (column !== undefined) place.push(`column ${column}`);
  const seen = found === undefined ? "" : `found ${found === "" ? "nothing" : quoted(found)}; `;
  return { code: problem.code, path: place.join(", "), message: `${place.join(", ")}: ${seen}wanted ${problem.wanted}.` };
}
