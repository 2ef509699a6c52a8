/**
 * What the science asks of its own numbers. What people hand in has been held to its bounds, by row and column, where it
 * was read: a number out of bounds in here is a fault of the program, and is told as one.
 */

/** @throws RangeError that names `path` unless `value` is a finite number above zero. */
export function requirePositive(value: number, path: string, what: string, unit: string): void {
  if (Number.isFinite(value) && value > 0) return;
  throw new RangeError(`${path}: ${what} must be a number of ${unit} above zero; found ${value}.`);
}

/** @throws RangeError that names `path` unless `low <= value <= high`. */
export function requireWithin(value: number, low: number, high: number, path: string, what: string, unit: string): void {
  if (value >= low && value <= high) return;
  throw new RangeError(`${path}: ${what} must lie between ${low} and ${high} ${unit}; found ${value}.`);
}
