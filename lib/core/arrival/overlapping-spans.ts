/** A span of time; ends that are null are open. The first moment belongs to it, the last does not. */
export interface Span {
  readonly fromEpochSeconds: number | null;
  readonly toEpochSeconds: number | null;
}

export interface Overlap {
  /** Places in the list of spans: the one that began first, and one that begins before it has ended. */
  readonly earlier: number;
  readonly later: number;
}

/** Each span that begins before an earlier one has ended, with the one that it runs into; two that begin together count in the list's order. */
export function overlappingSpans(spans: readonly Span[]): Overlap[] {
  const inTime = spans.map((span, place) => ({ ...span, place })).sort((a, b) => compare(startOf(a), startOf(b)) || a.place - b.place);
  const overlaps: Overlap[] = [];
  let latest = inTime[0];
  for (const next of inTime.slice(1)) {
    if (latest === undefined) break;
    if (startOf(next) < endOf(latest)) overlaps.push({ earlier: latest.place, later: next.place });
    if (endOf(next) > endOf(latest)) latest = next;
  }
  return overlaps;
}

/** In order of time, as deployments and clock corrections are kept. */
export function inOrderOfTime<Item extends Span>(items: readonly Item[]): Item[] {
  return items.toSorted((a, b) => compare(startOf(a), startOf(b)));
}

/** Two open starts are alike: their difference would be no number. */
function compare(first: number, second: number): number {
  return first === second ? 0 : first - second;
}

function startOf({ fromEpochSeconds }: Span): number {
  return fromEpochSeconds ?? Number.NEGATIVE_INFINITY;
}

function endOf({ toEpochSeconds }: Span): number {
  return toEpochSeconds ?? Number.POSITIVE_INFINITY;
}
