import { gammaQuantile, gammaUpper } from "../stats/gamma-law.ts";
import type { Interval } from "../stats/wilson-interval.ts";
import { allCases, checkWeights, infectiousness } from "./case-series.ts";
import { meanOfWeights } from "./serial-interval-weights.ts";

export type InstantaneousInput = {
  /** Cases by day of onset that were infected here. */
  readonly local: ArrayLike<number>;
  /** Cases infected elsewhere, by the same days; null = none. They infect and are not explained. */
  readonly imported: ArrayLike<number> | null;
  /** w_0 … w_last of the serial interval. */
  readonly weights: ArrayLike<number>;
  /** τ, days of the window; default 7. */
  readonly windowDays?: number;
  /** Gamma prior: shape a and **scale** b; default 1 and 5 (mean and deviation 5). */
  readonly prior?: { readonly shape: number; readonly scale: number };
};

/** Why a window is not to be shown. */
export type HiddenWindow = "too_early" | "too_few_cases" | "no_infectiousness";

export type WindowedR = {
  /** Last day of the window, as index of the series. */
  readonly day: number;
  /** ΣI and ΣΛ of the window, days without infectiousness left out. */
  readonly cases: number;
  readonly infectiousness: number;
  /** Of the posterior gamma law (**scale**). */
  readonly shape: number;
  readonly scale: number;
  readonly mean: number;
  readonly standardDeviation: number;
  readonly median: number;
  /** 95 %, equal tails. */
  readonly interval: Interval;
  readonly probabilityAboveOne: number;
  /** Not null: keep it off the screen; the figures are for checks. */
  readonly hidden: HiddenWindow | null;
};

/** Largest posterior coefficient of variation that is shown (convention). */
export const WIDEST_VARIATION = 0.3;

/**
 * Instantaneous R by day: how many people a case of that day would infect if conditions stayed as
 * they are. Posterior Gamma(a + ΣI, 1/(1/b + ΣΛ)) over the window that ends on the day.
 *
 * Hidden: windows that end sooner than τ or one mean serial interval after the first case
 * (`too_early`); windows with a posterior coefficient of variation 1/√(a + ΣI) above 0.3, for a = 1
 * fewer than 11 cases (`too_few_cases`); windows in which nobody could infect
 * (`no_infectiousness`). A day with Λ = 0 carries no information, and its cases leave ΣI.
 *
 * Not the same as the case reproduction number (`caseR`), which looks forward from a case.
 *
 * @returns one entry per day on which a whole window ends; none for a series shorter than τ
 * @throws RangeError for counts or weights that are none, a window below 1, or a prior that is no law
 *
 * Cost: O(days × length of the weights). Source: Cori, Ferguson, Fraser & Cauchemez 2013, *A new
 * framework and software to estimate time-varying reproduction numbers*; methods C.9.5.
 */
export function instantaneousR(input: InstantaneousInput): WindowedR[] {
  const { local, imported, weights, windowDays = 7, prior = { shape: 1, scale: 5 } } = input;
  if (!Number.isSafeInteger(windowDays) || windowDays < 1)
    throw new RangeError("windowDays: at least one day");
  for (const part of [prior.shape, prior.scale]) {
    if (!(part > 0 && Number.isFinite(part))) throw new RangeError("prior: shape and scale > 0");
  }
  const all = allCases(local, imported);
  checkWeights(weights);
  const pressure = infectiousness(all, weights);
  const first = all.findIndex((count) => count > 0);
  const soonest = first + Math.max(windowDays, meanOfWeights(weights));

  const windows: WindowedR[] = [];
  for (let day = windowDays - 1; day < all.length; day++) {
    let cases = 0;
    let total = 0;
    for (let t = day - windowDays + 1; t <= day; t++) {
      if (!(pressure[t]! > 0)) continue;
      cases += local[t]!;
      total += pressure[t]!;
    }
    const shape = prior.shape + cases;
    const scale = 1 / (1 / prior.scale + total);
    let hidden: HiddenWindow | null = null;
    if (total === 0) hidden = "no_infectiousness";
    else if (first < 0 || day < soonest) hidden = "too_early";
    else if (shape * WIDEST_VARIATION ** 2 < 1) hidden = "too_few_cases";
    windows.push({
      day,
      cases,
      infectiousness: total,
      shape,
      scale,
      mean: shape * scale,
      standardDeviation: Math.sqrt(shape) * scale,
      median: gammaQuantile(0.5, shape, scale),
      interval: [gammaQuantile(0.025, shape, scale), gammaQuantile(0.975, shape, scale)],
      probabilityAboveOne: gammaUpper(1, shape, scale),
      hidden,
    });
  }
  return windows;
}
