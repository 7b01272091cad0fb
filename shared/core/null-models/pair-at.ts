/** Where `pairAt` puts the two ends: lower first. */
export type TwoEnds = [number, number];

/**
 * The unordered pair with a given index: (0,1) (0,2) (1,2) (0,3) … have the indices 0, 1, 2, 3 … The
 * higher end is j = ⌊(1 + √(1 + 8t))/2⌋, put right by one where the root was rounded; the lower is
 * t − j(j − 1)/2.
 *
 * @param index t, 0 … 2^49; not checked, since this stands in inner loops
 * @param out receives lower and higher end
 *
 * Cost: O(1). Source: methods C.7.2.
 */
export function pairAt(index: number, out: TwoEnds): void {
  let high = Math.floor((1 + Math.sqrt(1 + 8 * index)) / 2);
  while ((high * (high - 1)) / 2 > index) high--;
  while ((high * (high + 1)) / 2 <= index) high++;
  out[0] = index - (high * (high - 1)) / 2;
  out[1] = high;
}
