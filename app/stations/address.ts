/** Where a station is described. */
export function addressOf(id: string): string {
  return `/stations/${encodeURIComponent(id)}`;
}
