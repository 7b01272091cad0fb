import type { Baseline } from "../../../../shared/contracts/compare.ts";
import type { RunResult } from "../run-verdict.ts";
import type { PlotCell, PlotTable } from "./plot-csv.ts";

export type Curve = RunResult["degrees"] | RunResult["sizes"];

export type CurvePoint = {
  /** Contact pairs of a person, or people in a group. */
  at: number;
  observed: number;
  /** Pointwise 95 %. */
  band?: [number, number];
  /** The envelope of the whole curve. */
  whole?: [number, number];
  binomial?: number;
  poisson?: number;
};

/** Entries of a curve as points, up to the last that holds anything; `first` is what entry 0 means. */
export function curvePoints(curve: Curve, baseline: Baseline | null, first: 0 | 1): CurvePoint[] {
  const bands = baseline === null ? undefined : curve.baselines[baseline];
  const laws = "binomial" in curve ? curve : { binomial: null, poisson: null };
  const points = curve.observed.map((observed, entry): CurvePoint => {
    const band = pairAt(bands?.low, bands?.high, entry);
    const whole = pairAt(bands?.globalLow, bands?.globalHigh, entry);
    const [binomial, poisson] = [laws.binomial?.[entry], laws.poisson?.[entry]];
    return {
      at: entry + first,
      observed,
      ...(band ? { band } : {}),
      ...(whole ? { whole } : {}),
      ...(binomial === undefined ? {} : { binomial }),
      ...(poisson === undefined ? {} : { poisson }),
    };
  });
  const last = points.findLastIndex(
    ({ observed, band, whole, binomial = 0 }) =>
      observed > 0 || (band?.[1] ?? 0) > 0 || (whole?.[1] ?? 0) > 0 || binomial >= 0.5,
  );
  return points.slice(0, Math.max(last, 0) + 1);
}

function pairAt(
  low: readonly number[] | null | undefined,
  high: readonly number[] | null | undefined,
  entry: number,
): [number, number] | undefined {
  const [from, to] = [low?.[entry], high?.[entry]];
  return from === undefined || to === undefined ? undefined : [from, to];
}

/** The points as a table; the last entry of a full curve reads "that many or more". */
export function curveTable(points: readonly CurvePoint[], curve: Curve, names: CurveNames) {
  const withLaws = points.some(({ binomial }) => binomial !== undefined);
  const rows = points.map((point, entry): PlotCell[] => [
    entry === curve.observed.length - 1 ? `${point.at} or more` : String(point.at),
    point.observed,
    point.band?.[0] ?? null,
    point.band?.[1] ?? null,
    point.whole?.[0] ?? null,
    point.whole?.[1] ?? null,
    ...(withLaws ? [point.binomial ?? null, point.poisson ?? null] : []),
  ]);
  const head = [
    names.at,
    names.observed,
    "95 % from",
    "95 % to",
    "whole curve from",
    "whole curve to",
    ...(withLaws ? ["binomial law", "Poisson law"] : []),
  ];
  return { head, rows } satisfies PlotTable;
}

export type CurveNames = { at: string; observed: string };

/** Where the curve on record leaves the envelope of the whole curve, in words. */
export function outsideWords(points: readonly CurvePoint[], at: string): string {
  const held = points.filter(({ whole }) => whole !== undefined);
  if (held.length === 0) return "";
  const places = held.filter(
    ({ observed, whole }) => whole && (observed < whole[0] || observed > whole[1]),
  );
  if (places.length === 0) return `Nowhere outside the envelope of the whole curve.`;
  const shown = places.slice(0, 6).map((point) => String(point.at));
  const more = places.length > shown.length ? " and further on" : "";
  return `Outside the envelope of the whole curve at ${shown.join(", ")}${more} ${at}.`;
}
