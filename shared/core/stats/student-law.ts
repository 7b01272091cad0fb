import { incompleteBeta } from "./incomplete-beta.ts";
import { betaLogit } from "./inverse-beta.ts";

function checkDegrees(df: number): void {
  if (!(df > 0 && df < Number.POSITIVE_INFINITY)) throw new RangeError("df must be > 0");
}

/**
 * Share of Student's t law with df degrees of freedom (any real > 0) at or below t.
 *
 * @throws RangeError for df <= 0 or t = NaN. Cost: as `incompleteBeta`. Source: DLMF 8.17 with
 * x = df/(df + t²).
 */
export function studentCdf(t: number, df: number): number {
  checkDegrees(df);
  if (Number.isNaN(t)) throw new RangeError("t must be a number");
  // x = 1/(1 + r²) and y = r²/(1 + r²) with r² = t²/df, without r² growing past the doubles.
  const ratio = Math.abs(t) / Math.sqrt(df);
  const far = ratio > 1;
  const square = (far ? 1 / ratio : ratio) ** 2;
  const major = 1 / (1 + square);
  const minor = square * major;
  const [x, y] = far ? [minor, major] : [major, minor];
  const half = incompleteBeta(x, df / 2, 0.5, y).lower / 2;
  return t < 0 ? half : 1 - half;
}

/**
 * t with the share p of Student's law below it. p = 0 and 1 give −∞ and +∞.
 *
 * @throws RangeError for df <= 0 or p outside 0 … 1. Cost: 4 to 10 incomplete beta functions.
 */
export function studentQuantile(p: number, df: number): number {
  checkDegrees(df);
  if (!(p >= 0 && p <= 1)) throw new RangeError("a probability must lie in 0 … 1");
  if (p === 0) return Number.NEGATIVE_INFINITY;
  if (p > 0.5) return -studentQuantile(1 - p, df);
  if (p === 0.5) return 0;
  // t²/df = y/x: the logit of x says it without a subtraction.
  const logit = p > 0.25 ? betaLogit(1 - 2 * p, df / 2, 0.5, true) : betaLogit(2 * p, df / 2, 0.5);
  return -Math.sqrt(df) * Math.exp(-logit / 2);
}
