/** Rows of cells in columns: the first set left, the others right. */
export function alignedRows(rows: readonly (readonly string[])[]): string[] {
  const widths = rows.reduce<number[]>((known, row) => row.map((cell, i) => Math.max(known[i] ?? 0, cell.length)), []);
  return rows.map((row) => row.map((cell, i) => (i === 0 ? cell.padEnd(widths[i] ?? 0) : cell.padStart(widths[i] ?? 0))).join("  ").trimEnd());
}

/** A heading with its lines set in under it; nothing where there are none. */
export function section(heading: string, lines: readonly string[]): string[] {
  return lines.length === 0 ? [] : ["", heading, ...lines.map((line) => `  ${line}`)];
}
