import { gammaCdf, gammaQuantile, gammaUpper } from "./gamma-law.ts";

/** Share of the χ² law with df degrees of freedom (any real > 0) at or below x. */
export function chiSquaredCdf(x: number, df: number): number {
  return gammaCdf(x, df / 2, 2);
}

/** Share of the χ² law above x: the p-value of a χ² statistic. */
export function chiSquaredUpper(x: number, df: number): number {
  return gammaUpper(x, df / 2, 2);
}

/** p-quantile of the χ² law with df degrees of freedom. */
export function chiSquaredQuantile(p: number, df: number): number {
  return gammaQuantile(p, df / 2, 2);
}
