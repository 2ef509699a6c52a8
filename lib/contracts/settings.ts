import * as z from "zod/mini";
import { InputError } from "#lib/core/failures/input-error.ts";
import type { InputIssue } from "#lib/core/failures/input-error.ts";

const number = (range: { above?: number; from?: number; to: number }) =>
  z.number().check(range.above === undefined ? z.gte(range.from ?? 0) : z.gt(range.above), z.lte(range.to));

/**
 * What a person may set, in the units of files and screens. `tiltHours` is the standard deviation of the time by
 * which frequencies 0.03 Hz apart leave the storm at different times. The ranges keep out what can only be a slip
 * of unit or sign; they are wide of anything sensible.
 */
const settingsShape = z.strictObject({
  gravity: number({ from: 9.5, to: 10.1 }),
  spread: z.strictObject({
    distanceKm: number({ from: 0, to: 5000 }),
    timeHours: number({ from: 0, to: 240 }),
    sharedCorrelation: number({ from: 0, to: 1 }),
    azimuthScaleDegrees: number({ above: 0, to: 360 }),
    tiltHours: number({ from: 0, to: 240 }),
    scaleFraction: number({ from: 0, to: 0.5 }),
  }),
  belongPrior: number({ above: 0, to: 1 }),
  sight: z.boolean(),
  timed: z.strictObject({
    durationHours: number({ from: 0, to: 240 }),
    spectrumWidthHz: number({ above: 0, to: 1 }),
  }),
  band: z.strictObject({ lowHz: number({ above: 0, to: 1 }), highHz: number({ above: 0, to: 1 }) }),
});

const overridesShape = z.extend(z.partial(settingsShape), {
  spread: z.optional(z.partial(settingsShape.shape.spread)),
  timed: z.optional(z.partial(settingsShape.shape.timed)),
  band: z.optional(z.partial(settingsShape.shape.band)),
});

export type PublicSettings = z.infer<typeof settingsShape>;

export const DEFAULT_PUBLIC_SETTINGS: PublicSettings = {
  gravity: 9.80665,
  spread: { distanceKm: 150, timeHours: 6, sharedCorrelation: 0.5, azimuthScaleDegrees: 30, tiltHours: 4, scaleFraction: 0.02 },
  belongPrior: 0.95,
  sight: true,
  timed: { durationHours: 6, spectrumWidthHz: 0.012 },
  band: { lowHz: 0.03, highHz: 0.12 },
};

/**
 * The settings to use: the defaults, with what `overrides` says put in their place.
 *
 * @throws InputError for keys that are not settings, values of the wrong kind or out of range, each by its address.
 */
export function readSettings(overrides: unknown, sourceName = "settings"): PublicSettings {
  const parsed = overridesShape.safeParse(overrides);
  if (!parsed.success) throw new InputError(parsed.error.issues.map((issue) => issueOf(issue, overrides, sourceName)));
  const given = parsed.data;
  const settings = {
    gravity: given.gravity ?? DEFAULT_PUBLIC_SETTINGS.gravity,
    spread: { ...DEFAULT_PUBLIC_SETTINGS.spread, ...defined(given.spread) },
    belongPrior: given.belongPrior ?? DEFAULT_PUBLIC_SETTINGS.belongPrior,
    sight: given.sight ?? DEFAULT_PUBLIC_SETTINGS.sight,
    timed: { ...DEFAULT_PUBLIC_SETTINGS.timed, ...defined(given.timed) },
    band: { ...DEFAULT_PUBLIC_SETTINGS.band, ...defined(given.band) },
  };
  const { lowHz, highHz } = settings.band;
  if (lowHz < highHz) return settings;
  const message = `${sourceName}, band: found ${lowHz} to ${highHz} Hz; wanted lowHz below highHz.`;
  throw new InputError([{ code: "out-of-range", path: "band", message }]);
}

/** JSON has no undefined, but a form may hand one over: it means "not set", and must not wipe out a default. */
function defined<Part extends object>(part: Part | undefined): { [Key in keyof Part]?: Exclude<Part[Key], undefined> } {
  const entries = Object.entries(part ?? {}).filter(([, value]) => value !== undefined);
  return Object.fromEntries(entries) as { [Key in keyof Part]?: Exclude<Part[Key], undefined> };
}

function issueOf(issue: z.core.$ZodIssue, overrides: unknown, sourceName: string): InputIssue {
  const path = issue.path.join(".");
  const place = [sourceName, path].filter((part) => part !== "").join(", ");
  const value = valueAt(overrides, issue.path);
  const found = value === undefined ? "nothing" : JSON.stringify(value);
  const shortFound = found.length > 60 ? `${found.slice(0, 60)}...` : found;
  if (issue.code === "unrecognized_keys") {
    const keys = issue.keys.map((key) => JSON.stringify(key)).join(", ");
    const wanted = `only settings that exist (${keysAt(issue.path).join(", ")})`;
    return { code: "unknown-key", path, message: `${place}: found ${keys}; wanted ${wanted}.` };
  }
  return { code: issue.code, path, message: `${place}: found ${shortFound}; wanted ${wantedOf(issue)}.` };
}

function wantedOf(issue: z.core.$ZodIssue): string {
  if (issue.code === "too_small") return `a number ${issue.inclusive === true ? "of at least" : "above"} ${issue.minimum}`;
  if (issue.code === "too_big") return `a number ${issue.inclusive === true ? "of at most" : "below"} ${issue.maximum}`;
  if (issue.code !== "invalid_type") return "a value that this setting takes";
  return { number: "a number", boolean: "true or false", object: "an object of settings" }[String(issue.expected)] ?? issue.expected;
}

function valueAt(value: unknown, path: readonly PropertyKey[]): unknown {
  return path.reduce<unknown>(
    (inner, key) => (typeof inner === "object" && inner !== null ? (inner as Record<PropertyKey, unknown>)[key] : undefined),
    value,
  );
}

function keysAt(path: readonly PropertyKey[]): string[] {
  return Object.keys(valueAt(DEFAULT_PUBLIC_SETTINGS, path) ?? {});
}
