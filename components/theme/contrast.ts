const hexColour = /^#([0-9a-f]{2})([0-9a-f]{2})([0-9a-f]{2})$/i;

/** Relative luminance of an sRGB colour, 0 (black) to 1 (white): WCAG 2.2, "relative luminance". */
export function relativeLuminance(hex: string): number {
  const parts = hexColour.exec(hex);
  if (!parts) throw new RangeError(`${hex} is not a colour of the form #RRGGBB`);
  const [r, g, b] = parts.slice(1).map((part) => linear(parseInt(part, 16) / 255)) as [number, number, number];
  return 0.2126 * r + 0.7152 * g + 0.0722 * b;
}

/**
 * Contrast of two colours, 1 to 21: WCAG 2.2, "contrast ratio". The order does not matter.
 * @example contrastRatio('#000000', '#FFFFFF') // 21
 */
export function contrastRatio(first: string, second: string): number {
  const [lighter, darker] = [relativeLuminance(first), relativeLuminance(second)].sort((a, b) => b - a) as [number, number];
  return (lighter + 0.05) / (darker + 0.05);
}

function linear(channel: number): number {
  return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
}
