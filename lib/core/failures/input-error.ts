/** One thing that is wrong with what was handed in. `path` is an address such as `stations[2].depthMetres`. */
export interface InputIssue {
  readonly code: string;
  readonly path: string;
  readonly message: string;
}

/**
 * What was handed in cannot be used, and every reason why, as whole sentences for the person who handed it in.
 * Never thrown for a scientific outcome (those are values) nor for a bug of ours.
 */
export class InputError extends Error {
  readonly issues: readonly InputIssue[];

  constructor(issues: readonly InputIssue[]) {
    super(issues.map((issue) => issue.message).join("\n"));
    this.name = "InputError";
    this.issues = issues;
  }
}
