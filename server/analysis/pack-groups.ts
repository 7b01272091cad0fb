/** Distance between neighbouring people in a picture, in its own units. */
export const SPACING = 40;

export type Position = { readonly x: number; readonly y: number };

/** Rounded to hundredths: finer digits differ between machines and nobody sees them. */
export function rounded(value: number): number {
  return Math.round(value * 100) / 100;
}

/** Side of the square kept free for a group of so many people; one alone needs little. */
export function sideOf(people: number): number {
  return SPACING * (people === 1 ? 1.2 : 1.2 * Math.sqrt(people) + 0.8);
}

/** A rectangle that fills with lines of squares, from its top left. */
class Block {
  readonly #left: number;
  readonly #top: number;
  readonly width: number;
  readonly #height: number;
  #across = 0;
  #down = 0;
  #line = 0;

  constructor(left: number, top: number, width: number, height: number) {
    this.#left = left;
    this.#top = top;
    this.width = width;
    this.#height = height;
  }

  /** Top left corner for a square no larger than those before it, or null when it does not fit. */
  place(side: number): Position | null {
    if (this.#across + side > this.width) {
      this.#across = 0;
      this.#down += this.#line;
      this.#line = 0;
    }
    if (side > this.width || this.#down + side > this.#height) return null;
    const at = { x: this.#left + this.#across, y: this.#top + this.#down };
    this.#across += side;
    this.#line = Math.max(this.#line, side);
    return at;
  }
}

/**
 * Places squares side by side so that none overlap and the whole comes out wider than high: in
 * rows as high as their first square, each row in blocks as wide as theirs, filled line by line.
 *
 * @param sides descending
 * @returns centres of the squares
 */
export function packGroups(sides: readonly number[]): Position[] {
  const area = sides.reduce((sum, side) => sum + side ** 2, 0);
  const rowWidth = Math.max(Math.sqrt(area * 1.7), sides[0] ?? 0);
  let top = 0;
  let height = 0;
  let right = 0;
  let block = new Block(0, 0, 0, 0);
  return sides.map((side) => {
    let corner = block.place(side);
    if (corner === null) {
      if (right + side > rowWidth || height === 0) {
        top += height;
        height = side;
        right = 0;
      }
      block = new Block(right, top, side, height);
      corner = block.place(side) ?? { x: right, y: top };
      right += side;
    }
    return { x: rounded(corner.x + side / 2), y: rounded(corner.y + side / 2) };
  });
}
