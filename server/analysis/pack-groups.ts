/** Distance between neighbouring people in a picture, in its own units. */
export const SPACING = 40;

export type Position = { readonly x: number; readonly y: number };

/**
 * Places discs side by side in rows, in the given order, so that none overlap and the whole comes
 * out a little wider than high.
 *
 * @param radii in spacings, largest first (any order works, the rows get looser)
 * @returns centres, rounded to hundredths
 */
export function packGroups(radii: readonly number[]): Position[] {
  const width = (radius: number) => SPACING * (1.2 * radius + 1);
  const area = radii.reduce((sum, radius) => sum + width(radius) ** 2, 0);
  const rowWidth = Math.max(Math.sqrt(area * 1.6), ...radii.slice(0, 1).map(width));
  const out: Position[] = [];
  let x = 0;
  let y = 0;
  let height = 0;
  for (const radius of radii) {
    const side = width(radius);
    if (x > 0 && x + side > rowWidth) {
      x = 0;
      y += height;
      height = 0;
    }
    out.push({ x: rounded(x + side / 2), y: rounded(y + side / 2) });
    x += side;
    height = Math.max(height, side);
  }
  return out;
}

/** Rounded to hundredths: finer digits differ between machines and nobody sees them. */
export function rounded(value: number): number {
  return Math.round(value * 100) / 100;
}
