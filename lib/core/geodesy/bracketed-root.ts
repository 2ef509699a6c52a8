/**
 * Where a continuous function is zero between two places at which its signs differ, by the Illinois variant of false
 * position. [source: dowell-1971] Stops where the function is within `settledWithin` of zero, or the two places have
 * met to the last digit.
 */
export function bracketedRoot(search: {
  evaluate: (place: number) => number;
  low: number;
  high: number;
  lowValue: number;
  highValue: number;
  settledWithin: number;
}): number {
  const { evaluate, settledWithin } = search;
  let { low: older, high: newer, lowValue: olderValue, highValue: newerValue } = search;
  for (;;) {
    const place = (older * newerValue - newer * olderValue) / (newerValue - olderValue);
    const value = evaluate(place);
    if (Math.abs(value) <= settledWithin || place === newer || place === older) return place;
    if (Math.sign(value) === Math.sign(newerValue)) {
      olderValue /= 2; // the same end moved twice: make the other one move next
    } else {
      older = newer;
      olderValue = newerValue;
    }
    newer = place;
    newerValue = value;
  }
}
