/** Numbers that look random and are the same on every machine. */
export interface RandomStream {
  /** A number in [0, 1) with 53 bits. */
  next(): number;
  /**
   * A whole number in 0 … n − 1, each equally likely.
   * @param n 1 … 2^53; not checked, since this stands in inner loops
   */
  below(n: number): number;
  /**
   * Puts whole numbers in 0 … n − 1 at `out[from]` … `out[to − 1]`: the same as calling `below` for
   * each in turn, faster.
   * @param n 1 … 2^31; not checked
   */
  fillBelow(n: number, out: Int32Array, from: number, to: number): void;
}

const TWO_32 = 2 ** 32;
const TWO_53 = 2 ** 53;

/** Spreads the bits of a 32-bit word (finalizer of MurmurHash3, public domain). */
function mix(word: number): number {
  let h = word;
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35);
  return h ^ (h >>> 16);
}

/** xoshiro128++ (Blackman and Vigna 2021, *Scrambled linear pseudorandom number generators*). */
export class Xoshiro implements RandomStream {
  #s0: number;
  #s1: number;
  #s2: number;
  #s3: number;

  /** @param state four 32-bit words, not all zero */
  constructor(state: readonly [number, number, number, number]) {
    [this.#s0, this.#s1, this.#s2, this.#s3] = state;
  }

  /** The next 32 bits, as a number >= 0. */
  word(): number {
    const s0 = this.#s0;
    const sum = (s0 + this.#s3) | 0;
    const result = (((sum << 7) | (sum >>> 25)) + s0) >>> 0;
    const shifted = this.#s1 << 9;
    this.#s2 ^= s0;
    this.#s3 ^= this.#s1;
    this.#s1 ^= this.#s2;
    this.#s0 ^= this.#s3;
    this.#s2 ^= shifted;
    this.#s3 = (this.#s3 << 11) | (this.#s3 >>> 21);
    return result;
  }

  next(): number {
    const high = this.word() >>> 5;
    return (high * 67108864 + (this.word() >>> 6)) / TWO_53;
  }

  below(n: number): number {
    if (n <= 2097152) {
      // The product fits a double, so its upper and lower 32 bits are exact (Lemire 2019, *Fast
      // random integer generation in an interval*): one division in n cases of 2^32 only.
      let product = this.word() * n;
      let upper = Math.floor(product / TWO_32);
      if (product - upper * TWO_32 < n) {
        const least = TWO_32 % n;
        while (product - upper * TWO_32 < least) {
          product = this.word() * n;
          upper = Math.floor(product / TWO_32);
        }
      }
      return upper;
    }
    const most = TWO_53 - (TWO_53 % n);
    for (;;) {
      const drawn = (this.word() >>> 5) * 67108864 + (this.word() >>> 6);
      if (drawn < most) return drawn % n;
    }
  }

  fillBelow(n: number, out: Int32Array, from: number, to: number): void {
    if (n > 2097152) {
      for (let k = from; k < to; k++) out[k] = this.below(n);
      return;
    }
    // `word` and `below` once more with the state in local variables, which is what makes it fast.
    const least = TWO_32 % n;
    let s0 = this.#s0;
    let s1 = this.#s1;
    let s2 = this.#s2;
    let s3 = this.#s3;
    for (let k = from; k < to; ) {
      const sum = (s0 + s3) | 0;
      const product = ((((sum << 7) | (sum >>> 25)) + s0) >>> 0) * n;
      const shifted = s1 << 9;
      s2 ^= s0;
      s3 ^= s1;
      s1 ^= s2;
      s0 ^= s3;
      s2 ^= shifted;
      s3 = (s3 << 11) | (s3 >>> 21);
      const upper = Math.floor(product / TWO_32);
      if (product - upper * TWO_32 >= least) out[k++] = upper;
    }
    this.#s0 = s0;
    this.#s1 = s1;
    this.#s2 = s2;
    this.#s3 = s3;
  }
}

/**
 * A stream of its own for each replicate: the same seed and number give the same stream on every
 * machine and in any order, so results do not depend on how many workers share the replicates.
 *
 * @param seed whole number 0 … 2^53 − 1
 * @param stream number of the stream, 0 … 2^32 − 1
 * @throws RangeError for anything else
 */
export function createStream(seed: number, stream: number): Xoshiro {
  if (!Number.isSafeInteger(seed) || seed < 0) throw new RangeError("seed: whole number >= 0");
  if (!Number.isSafeInteger(stream) || stream < 0 || stream >= TWO_32) {
    throw new RangeError("stream: whole number from 0 to 2^32 - 1");
  }
  const low = seed | 0;
  const high = Math.floor(seed / TWO_32) | 0;
  const words: [number, number, number, number] = [0, 0, 0, 0];
  // Each word hangs on all inputs; the odd constants keep the words of one stream apart.
  let held = 0x9e3779b9 | 0;
  for (let at = 0; at < 4; at++) {
    held = mix((held + low + Math.imul(at + 1, 0x9e3779b9)) | 0);
    held = mix((held ^ Math.imul(stream + 1, 0x85ebca6b)) | 0);
    held = mix((held + Math.imul(high, 0xc2b2ae35) + stream) | 0);
    words[at] = held;
  }
  if (words.every((word) => word === 0)) words[0] = 1;
  return new Xoshiro(words);
}
