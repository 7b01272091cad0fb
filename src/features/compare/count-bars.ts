import type { BarItem } from "../../components/bars/bars.tsx";

/** Degrees beyond this are drawn as one bar, so that a long tail does not thin out the rest. */
const mostDegrees = 20;

/** People by their number of contact pairs; what lies past the last bar is summed in it. */
export function degreeBars(degreeCounts: readonly number[]): BarItem[] {
  const last = degreeCounts.findLastIndex((count) => count > 0);
  const shown = degreeCounts.slice(0, Math.min(last, mostDegrees) + 1);
  const bars = shown.map((value, degree) => ({ label: String(degree), value }));
  if (last <= mostDegrees) return bars;
  const tail = degreeCounts.slice(mostDegrees + 1).reduce((sum, count) => sum + count, 0);
  return [...bars, { label: `${mostDegrees + 1}+`, value: tail }];
}

/** First size of each class; single sizes while they are small, then about a doubling. */
const sizeStarts = [1, 2, 3, 4, 5, 6, 11, 21, 51, 101, 201, 501, 1001, 2001, 5001, 10_001];

/** Connected groups by their size, in classes; people without a contact pair are groups of 1. */
export function sizeBars(componentSizes: readonly number[]): BarItem[] {
  const largest = componentSizes.reduce((most, size) => Math.max(most, size), 0);
  const classes = sizeStarts
    .filter((start) => start <= largest)
    .map((start, place) => {
      const next = sizeStarts[place + 1];
      const to = next === undefined ? Number.POSITIVE_INFINITY : next - 1;
      return { start, to, count: 0 };
    });
  for (const size of componentSizes) {
    const found = classes.findLast(({ start }) => start <= size);
    if (found) found.count++;
  }
  return classes.map(({ start, to, count }) => ({
    label: to === start ? `${start}` : Number.isFinite(to) ? `${start}–${to}` : `${start}+`,
    value: count,
  }));
}
