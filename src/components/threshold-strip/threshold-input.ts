/** What a threshold strip shows; every figure comes from the report, none is worked out here. */
export type ThresholdInput = {
  /** Pairs per person as seen through the interviews; null when it could not be worked out. */
  value: number | null;
  interval: readonly [number, number] | null;
  /** People of the figure; null leaves window and connectivity out. */
  n: number | null;
  /** Half-width of the critical window; n^(-1/3) when undefined. */
  criticalHalfWidth?: number;
  /** Earlier values, oldest first. */
  trail?: readonly { day: string; value: number }[];
  /** False when no verdict may be given: the value is drawn hollow. */
  hasVerdict?: boolean;
  /** Why there is no value, in words. */
  reason?: string;
};

/** Half-width of the critical window round 1; null without people. */
export function halfWidth({ n, criticalHalfWidth }: ThresholdInput): number | null {
  if (criticalHalfWidth !== undefined) return criticalHalfWidth;
  return n === null || n < 1 ? null : n ** (-1 / 3);
}

/** Where all people would be connected under random mixing, ln n; null for fewer than two people. */
export function connectivity({ n }: ThresholdInput): number | null {
  return n === null || n < 2 ? null : Math.log(n);
}
