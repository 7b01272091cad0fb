/** Small seeded source of chance; everything random in the generator comes from one of these. */
export type Rng = SeededRng;

/** One splitmix32 step: spreads neighbouring seeds far apart. */
function mix(value: number): number {
  let z = (value + 0x9e3779b9) | 0;
  z = Math.imul(z ^ (z >>> 16), 0x21f0aaad);
  z = Math.imul(z ^ (z >>> 15), 0x735a2d97);
  return (z ^ (z >>> 15)) >>> 0;
}

/**
 * Source of chance for a seed and any number of labels (person, purpose). Equal input, equal
 * stream; streams with different labels are independent for our purposes.
 */
export function createRng(seed: number, ...labels: number[]): Rng {
  let key = mix(seed | 0) ^ mix(Math.floor(seed / 4294967296) | 0);
  for (const label of labels) key = mix(key ^ mix(label | 0));
  return new SeededRng(key);
}

/**
 * Marsaglia's xorshift128 (Journal of Statistical Software 2003), state filled by splitmix. A class
 * and not a bundle of closures: two are made for every person, and methods cost nothing to make.
 */
class SeededRng {
  private a: number;
  private b: number;
  private c: number;
  private d: number;

  constructor(key: number) {
    // Kept as signed 32-bit whole numbers: larger ones would be boxed again at every step.
    this.a = mix(key) | 0;
    this.b = mix(this.a ^ 1) | 0;
    this.c = mix(this.b ^ 2) | 0;
    this.d = mix(this.c ^ 3) | 1;
  }

  /** Uniform in [0, 1), 32 bits. */
  next(): number {
    const t = this.d ^ (this.d << 11);
    this.d = this.c;
    this.c = this.b;
    this.b = this.a;
    this.a = this.a ^ (this.a >>> 19) ^ t ^ (t >>> 8);
    return (this.a >>> 0) / 4294967296;
  }

  /** Whole number in [0, n). */
  below(n: number): number {
    return Math.floor(this.next() * n);
  }

  /** Whole number in [low, high], both included. */
  between(low: number, high: number): number {
    return low + this.below(high - low + 1);
  }

  chance(probability: number): boolean {
    return this.next() < probability;
  }

  /** @throws RangeError on an empty list. */
  pick<T>(items: readonly T[]): T {
    const item = items[this.below(items.length)];
    if (item === undefined) throw new RangeError("pick from an empty list");
    return item;
  }

  normal(): number {
    const radius = Math.sqrt(-2 * Math.log(1 - this.next()));
    return radius * Math.cos(2 * Math.PI * this.next());
  }

  exponential(mean: number): number {
    return -mean * Math.log(1 - this.next());
  }

  /**
   * Gamma with mean 1 and the given shape (1 or more), after Marsaglia and Tsang 2000: about 95 %
   * of tries are taken; the bound only guards the loop.
   */
  gamma(shape: number): number {
    const base = shape - 1 / 3;
    const scale = 1 / Math.sqrt(9 * base);
    for (let attempt = 0; attempt < 100; attempt += 1) {
      const x = this.normal();
      const v = (1 + scale * x) ** 3;
      if (v <= 0) continue;
      if (Math.log(1 - this.next()) < 0.5 * x * x + base * (1 - v + Math.log(v))) {
        return (base * v) / shape;
      }
    }
    return 1;
  }
}
