import { InputError } from "./input-error.ts";

/** @throws InputError `not-positive` at `path` unless `value` is a finite number above zero. */
export function requirePositive(value: number, path: string, what: string, unit: string): void {
  if (Number.isFinite(value) && value > 0) return;
  throw new InputError([
    { code: "not-positive", path, message: `${what} must be a number of ${unit} above zero; found ${value}.` },
  ]);
}

/** @throws InputError `out-of-range` at `path` unless `low <= value <= high`. */
export function requireWithin(value: number, low: number, high: number, path: string, what: string, unit: string): void {
  if (value >= low && value <= high) return;
  throw new InputError([
    { code: "out-of-range", path, message: `${what} must lie between ${low} and ${high} ${unit}; found ${value}.` },
  ]);
}
