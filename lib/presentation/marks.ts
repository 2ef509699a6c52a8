/** Possible sources are A, B, C and so on; points that were ruled out a, b, c. */
export function sourceMark(index: number): string {
  return letter(index, "A");
}

export function ruledOutMark(index: number): string {
  return letter(index, "a");
}

/** After the last letter they double: aa, bb. */
function letter(index: number, first: string): string {
  return String.fromCharCode(first.charCodeAt(0) + (index % 26)).repeat(1 + Math.floor(index / 26));
}
