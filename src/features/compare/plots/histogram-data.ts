import type { BaselineFigure } from "../run-verdict.ts";
import type { PlotTable } from "./plot-csv.ts";

type Histogram = NonNullable<BaselineFigure["histogram"]>;

export type OutlinePoint = { at: number; count: number };

/** Bins as the outline of a histogram, and the range of its axis with the observed value in it. */
export function histogramOutline(histogram: Histogram, observed: number | null) {
  // All replicates alike: one bar of some width round the one value.
  const flat = histogram.to <= histogram.from;
  const half = flat ? Math.max(0.5, Math.abs(histogram.from) * 0.01) : 0;
  const [from, to] = [histogram.from - half, histogram.to + half];
  // Bins of no width would hide all but the first of them.
  const all = histogram.counts.reduce((sum, count) => sum + count, 0);
  const counts = flat ? [all] : histogram.counts;
  const width = (to - from) / Math.max(1, counts.length);
  const outline: OutlinePoint[] = [{ at: from, count: 0 }];
  counts.forEach((count, bin) => {
    outline.push({ at: from + bin * width, count }, { at: from + (bin + 1) * width, count });
  });
  outline.push({ at: to, count: 0 });
  const [low, high] = [Math.min(from, observed ?? from), Math.max(to, observed ?? to)];
  const room = (high - low) * 0.04;
  return { outline, low: low - room, high: high + room };
}

const histogramHead = ["from", "to", "random networks", "on record"] as const;

/** The same as a table: bins with their random networks, and where the network on record lies. */
export function histogramTable(histogram: Histogram, observed: number | null): PlotTable {
  const { from, to, counts } = histogram;
  const width = (to - from) / Math.max(1, counts.length);
  const short = (value: number) => Number(value.toPrecision(6));
  if (to <= from) {
    const all = counts.reduce((sum, count) => sum + count, 0);
    const rows = [[short(from), short(to), all, observed === from ? "here" : ""]];
    if (observed !== null && observed !== from) {
      rows.push([short(observed), short(observed), 0, "here"]);
    }
    return { head: [...histogramHead], rows };
  }
  const rows = counts.map((count, bin) => {
    const [start, end] = [from + bin * width, from + (bin + 1) * width];
    const last = bin === counts.length - 1;
    const here =
      observed !== null && observed >= start && (last ? observed <= end : observed < end);
    return [short(start), short(end), count, here ? "here" : ""];
  });
  const outside = observed !== null && (observed < from || observed > to);
  const place = outside ? [[short(observed), short(observed), 0, "here"]] : [];
  return {
    head: [...histogramHead],
    rows: outside && observed < from ? [...place, ...rows] : [...rows, ...place],
  };
}
