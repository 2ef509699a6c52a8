/** Contrast of two colours as a page states them, from 1 to 21 (WCAG 2.2, contrast ratio). */
export function contrast(one: string, other: string): number {
  const [dark = NaN, light = NaN] = [luminance(one), luminance(other)].sort((a, b) => a - b);
  return (light + 0.05) / (dark + 0.05);
}

/** Lightness of a colour as the page paints it, from 0 to 1 (WCAG 2.2, relative luminance). */
export function luminance(colour: string): number {
  const [red = NaN, green = NaN, blue = NaN] = (colour.match(/[\d.]+/g) ?? []).map((part) => {
    const share = Number(part) / 255;
    return share <= 0.04045 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}
