/** Narrow and not breaking, so that a number never ends a line half said. */
const THIN_SPACE = "\u202f";
const MINUS = "\u2212";
/** Stands where a figure would, when there is none. */
export const NO_FIGURE = "\u2013";

/** A number with thin spaces between thousands and a true minus sign; `NO_FIGURE` for what is not a number. */
export function figure(value: number, fractionDigits = 0): string {
  if (!Number.isFinite(value)) return NO_FIGURE;
  const fixed = Math.abs(value).toFixed(fractionDigits);
  const [whole = "0", fraction] = fixed.split(".");
  const grouped = whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
  const negative = value < 0 && Number(fixed) !== 0;
  return `${negative ? MINUS : ""}${grouped}${fraction === undefined ? "" : `.${fraction}`}`;
}

/** A difference: always with its sign, but for zero. */
export function signedFigure(value: number, fractionDigits = 0): string {
  const plain = figure(value, fractionDigits);
  return value > 0 && Number(value.toFixed(fractionDigits)) !== 0 ? `+${plain}` : plain;
}

/** "p = 0.61", or "p > 0.99" where two digits would read as certain. */
export function pValueWords(pValue: number): string {
  const said = probabilityFigure(pValue);
  return /^[<>]/.test(said) ? `p\u00a0${said.charAt(0)}\u00a0${said.slice(1)}` : `p\u00a0=\u00a0${said}`;
}

/** A probability with two digits. None that was worked out is certain, so none reads as 0 or 1. */
export function probabilityFigure(probability: number): string {
  if (probability < 0.005) return "<0.01";
  if (probability >= 0.995) return ">0.99";
  return figure(probability, 2);
}

/** The probability by which a region is named, in per cent. */
export function percentWords(probability: number): string {
  return `${figure(probability * 100)}${THIN_SPACE}%`;
}

/** A value above 1 without the digits that its error leaves open: both end at the error's second digit, or at the unit. */
export function roundedToError(value: number, error: number): { value: number; error: number } {
  if (!(error > 0) || !Number.isFinite(error)) return { value, error };
  const step = Math.max(1, 10 ** (Math.floor(Math.log10(error)) - 1));
  return { value: Math.round(value / step) * step, error: Math.round(error / step) * step };
}

/** Rounded to two leading digits, for areas and spans that are not known better than that. */
export function twoLeadingDigits(value: number): number {
  if (value === 0 || !Number.isFinite(value)) return value;
  const step = 10 ** (Math.floor(Math.log10(Math.abs(value))) - 1);
  return Math.round(value / step) * step;
}
