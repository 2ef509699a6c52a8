/**
 * Which of the stations saw the storm: the subsets that the mixture sums over, each written as the stations left out.
 *
 * Up to `ALL_SUBSETS_UP_TO` stations every subset of at least `least` that belong is there. With more, those that
 * differ by at most two stations from `everyone`, and from each of `around` (sets of stations left out that a search
 * found better); the rest would add less than (1 - prior)^3 of what is summed. With more than `PAIRS_UP_TO` those that
 * differ by one: a third of the sum may be left out, but hardly any of the place, which many stations fix.
 */
const ALL_SUBSETS_UP_TO = 6;
const PAIRS_UP_TO = 12;

export type StraySet = readonly number[];

export function straySets(size: number, around: readonly StraySet[] = []): StraySet[] {
  const least = Math.min(2, size);
  const all = size <= ALL_SUBSETS_UP_TO ? everySubset(size) : [[], ...around].flatMap((centre) => neighbours(size, centre));
  const unique = new Map(all.map((set) => [set.join(","), set]));
  return [...unique.values()].filter((set) => size - set.length >= least);
}

function everySubset(size: number): StraySet[] {
  return Array.from({ length: 2 ** size }, (_, mask) => indices(size).filter((i) => mask & (1 << i)));
}

function neighbours(size: number, centre: StraySet): StraySet[] {
  const flips = indices(size).flatMap((i) => [[i], ...(size > PAIRS_UP_TO ? [] : indices(i).map((j) => [j, i]))]);
  return [centre, ...flips.map((flip) => flipped(size, centre, flip))];
}

function flipped(size: number, centre: StraySet, flip: readonly number[]): StraySet {
  return indices(size).filter((i) => centre.includes(i) !== flip.includes(i));
}

function indices(size: number): number[] {
  return Array.from({ length: size }, (_, i) => i);
}
