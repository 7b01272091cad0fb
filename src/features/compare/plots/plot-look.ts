/** The look shared by all plots: hairlines, small quiet figures, no legend boxes, nothing moves. */
export const tickLook = { fill: "var(--ink-2)", fontSize: 12 } as const;
export const axisLine = { stroke: "var(--ink-2)", strokeWidth: 1 } as const;
export const tickLine = { stroke: "var(--rule)", strokeWidth: 1 } as const;
export const plotMargin = { top: 22, right: 14, bottom: 22, left: 0 } as const;
export const gridLine = { stroke: "var(--rule)", strokeWidth: 1 } as const;

/** Round figures from `low` to `high`, about as many as wanted. */
export function roundTicks(low: number, high: number, wanted = 5): number[] {
  const span = high - low;
  if (!(span > 0)) return [low];
  const rough = span / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const step = [1, 2, 5, 10].map((one) => one * power).find((one) => one >= rough) ?? power * 10;
  const ticks: number[] = [];
  for (let at = Math.ceil(low / step) * step; at <= high + step * 1e-9; at += step) {
    // Sums of tenths drift; a tick is written as the round figure it stands for.
    ticks.push(Number(at.toPrecision(12)));
  }
  return ticks;
}

/** 0, 1, 2, 5, 10, 20, 50 … up to `most`, for axes that shrink what is large. */
export function growingTicks(most: number, from: 0 | 1): number[] {
  const ticks = from === 0 ? [0] : [];
  for (let power = 1; power <= most; power *= 10) {
    for (const one of [1, 2, 5]) if (one * power <= most) ticks.push(one * power);
  }
  // Three a decade stand too close once there are many.
  return ticks.length > 9 ? ticks.filter((at) => /^(0|10*)$/.test(String(at))) : ticks;
}
