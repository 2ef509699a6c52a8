import type { AnswerWarning } from "#lib/core/source/answer.ts";

/** Each warning once, in the order in which it was first given. */
export function distinctWarnings(warnings: readonly AnswerWarning[]): AnswerWarning[] {
  const distinct = new Map<string, AnswerWarning>();
  for (const warning of warnings) {
    const key = JSON.stringify([warning.code, warning.message]);
    if (!distinct.has(key)) distinct.set(key, warning);
  }
  return [...distinct.values()];
}
