/** A number as people write it, with a point or a comma for the decimals; null for anything else. */
export function writtenNumber(text: string): number | null {
  const plain = text.trim().replace(/^[\u2212\u2013]/, "-").replace(",", ".");
  return /^[+-]?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : null;
}
