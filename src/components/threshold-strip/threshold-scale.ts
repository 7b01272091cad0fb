/** The logarithmic axis of a threshold strip. */
export type ThresholdScale = {
  /** Ends of the axis in pairs per person, powers of two. */
  low: number;
  high: number;
  ticks: readonly { value: number; x: number; label: string }[];
  /** Position of a value, held inside the axis (0 stands at the left end). */
  x: (value: number) => number;
};

const usualLow = 0.25;
const usualHigh = 16;
const lowest = 1 / 64;
const highest = 4096;

/**
 * Lays pairs per person over `left` … `right` pixels, 0.25 … 16 and further in powers of two when
 * a value needs it. Zero has no place on such an axis and is held at its end.
 */
export function createThresholdScale(
  values: readonly number[],
  left: number,
  right: number,
): ThresholdScale {
  let low = usualLow;
  let high = usualHigh;
  for (const value of values) {
    if (!(value > 0) || !Number.isFinite(value)) continue;
    while (value < low && low > lowest) low /= 2;
    while (value > high && high < highest) high *= 2;
  }
  const span = Math.log2(high / low);
  const x = (value: number) => {
    if (!(value > 0)) return left;
    const share = Math.log2(value / low) / span;
    return left + Math.min(1, Math.max(0, share)) * (right - left);
  };
  // Labels every second power of two where they would touch.
  const step = (right - left) / span < 34 ? 4 : 2;
  const ticks: { value: number; x: number; label: string }[] = [];
  for (let value = 1; value >= low; value /= step) ticks.unshift(tick(value, x));
  for (let value = step; value <= high; value *= step) ticks.push(tick(value, x));
  return { low, high, ticks, x };
}

function tick(value: number, x: (value: number) => number) {
  const label = value >= 1 ? value.toLocaleString() : String(Number(value.toPrecision(3)));
  return { value, x: x(value), label };
}
