/** Spaces and letters beyond ASCII stand in an address as per cent signs and digits; null where those mean no text. */
export function decodedPart(written: string): string | null {
  try {
    return decodeURIComponent(written);
  } catch {
    return null;
  }
}
