/** A stream of numbers that the same seed always repeats. */
export interface RandomStream {
  /** Uniform in [0, 1). */
  readonly uniform: () => number;
  readonly between: (low: number, high: number) => number;
  /** Whole number from `low` to `high`, both possible. */
  readonly whole: (low: number, high: number) => number;
  /** Standard normal: mean 0, standard deviation 1. */
  readonly normal: () => number;
}

/**
 * Small fast counting generator, 32-bit (Doty-Humphrey's sfc32, public domain) for uniform numbers, Box and Muller
 * (1958) for normal ones. `path` names an independent stream under one seed, such as the number of the storm.
 */
export function randomStream(seed: number, ...path: readonly number[]): RandomStream {
  const start = path.reduce((mixed, step) => scramble(mixed ^ scramble(step + 0x9e3779b9)), scramble(seed));
  let a = start;
  let b = scramble(start + 1);
  let c = scramble(start + 2);
  let counter = 1;
  const uniform = (): number => {
    const sum = (((a + b) | 0) + counter) | 0;
    counter = (counter + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return (sum >>> 0) / 4294967296;
  };
  for (let i = 0; i < 15; i++) uniform(); // until the seed has spread through the state
  return {
    uniform,
    between: (low, high) => low + (high - low) * uniform(),
    whole: (low, high) => low + Math.floor((high - low + 1) * uniform()),
    normal: () => Math.sqrt(-2 * Math.log(1 - uniform())) * Math.cos(2 * Math.PI * uniform()),
  };
}

function scramble(value: number): number {
  let mixed = value | 0;
  mixed = Math.imul(mixed ^ (mixed >>> 16), 0x85ebca6b);
  mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
  return mixed ^ (mixed >>> 16);
}
