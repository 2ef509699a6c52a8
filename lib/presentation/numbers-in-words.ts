const WORDS = [
  "no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve",
] as const;

/** Counts up to twelve are words in a sentence; above that figures read better. */
export function countWord(count: number): string {
  return WORDS[count] ?? String(count);
}

export function startingSentence(words: string): string {
  return words.charAt(0).toUpperCase() + words.slice(1);
}

/** "1", "1 and 2", "1, 2 and 3". */
export function listWords(parts: readonly string[]): string {
  const last = parts.at(-1) ?? "";
  return parts.length < 2 ? last : `${parts.slice(0, -1).join(", ")} and ${last}`;
}

/** "1 station", "6 stations". */
export function counted(count: number, noun: string): string {
  return `${count}\u00a0${noun}${count === 1 ? "" : "s"}`;
}
