/**
 * A spreadsheet takes a cell that begins with one of = + - @ for a formula and works it out, whoever wrote it. Text that
 * we write therefore gets an apostrophe before such a sign, and before apostrophes that stand before one; reading takes
 * one apostrophe off again. So every text comes back as it was, and no cell of ours is a formula.
 */
export function guarded(text: string): string {
  return /^'*[=+\-@]/.test(text) ? `'${text}` : text;
}

/** The text that `guarded` was given; text that it would not have written stays as it is. */
export function unguarded(cell: string): string {
  return /^'+[=+\-@]/.test(cell) ? cell.slice(1) : cell;
}
