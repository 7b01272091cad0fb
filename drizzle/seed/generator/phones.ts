/**
 * Telephone numbers that ring nowhere: blocks which the regulators of two countries keep free for
 * drama and print (Ofcom's drama ranges, ACMA's numbers for creative works; both from memory).
 * They are well formed, so that the same checks apply to them as to real ones, and every number of
 * the generator comes from this list, which is how invented people can be told apart.
 */
const SHORT_BLOCKS = [
  "+441174960",
  "+441214960",
  "+441314960",
  "+441134960",
  "+441144960",
  "+441164960",
  "+441414960",
  "+441514960",
  "+441614960",
  "+442079460",
  "+441914980",
  "+442896496",
  "+442920180",
];
const LONG_BLOCKS = [
  "+6125550",
  "+6127010",
  "+6135550",
  "+6137010",
  "+6175550",
  "+6177010",
  "+6185550",
  "+6187010",
];
const SHORT_SIZE = 1000;
const LONG_SIZE = 10_000;

/** How many different numbers there are. */
export const PHONE_POOL = SHORT_BLOCKS.length * SHORT_SIZE + LONG_BLOCKS.length * LONG_SIZE;

/** True for a number of the invented blocks. */
export function isInventedPhone(phone: string): boolean {
  return [...SHORT_BLOCKS, ...LONG_BLOCKS].some((block) => phone.startsWith(block));
}

/** The index-th invented number (E.164), each different; null once the pool is used up. */
export function inventedPhone(index: number): string | null {
  const short = SHORT_BLOCKS.length * SHORT_SIZE;
  if (index < short) {
    const at = index % SHORT_BLOCKS.length;
    const block = SHORT_BLOCKS[at];
    // 617 has no factor in common with 1000, so this visits every line of a block once, in no
    // visible order; each block starts elsewhere, so that last digits differ between blocks too.
    const line = (Math.floor(index / SHORT_BLOCKS.length) * 617 + at * 379 + 142) % SHORT_SIZE;
    return `${block}${String(line).padStart(3, "0")}`;
  }
  const rest = index - short;
  if (rest >= LONG_BLOCKS.length * LONG_SIZE) return null;
  const at = rest % LONG_BLOCKS.length;
  const block = LONG_BLOCKS[at];
  const line = (Math.floor(rest / LONG_BLOCKS.length) * 6173 + at * 1237 + 1409) % LONG_SIZE;
  return `${block}${String(line).padStart(4, "0")}`;
}
