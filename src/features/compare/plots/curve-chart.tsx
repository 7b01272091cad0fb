import { Area, ComposedChart, Line, XAxis, YAxis } from "recharts";
import { formatNumber } from "../../../lib/formatters.ts";
import { useWidth } from "../../../lib/use-width.ts";
import type { CurvePoint } from "./curve-data.ts";
import { axisLine, growingTicks, plotMargin, roundTicks, tickLine, tickLook } from "./plot-look.ts";

export type CurveChartProps = {
  points: readonly CurvePoint[];
  atLabel: string;
  valueLabel: string;
  greyed: boolean;
  /** Shrinks what is large on both axes, so that a long tail and single groups stay readable. */
  growing?: boolean;
};

const height = 270;

/** A curve on record with its bands and laws. Drawn plainly; the words stand in the page. */
export function CurveChart({ points, atLabel, valueLabel, greyed, growing }: CurveChartProps) {
  const [ref, width] = useWidth(560);
  const first = points[0]?.at ?? 0;
  const last = Math.max(points.at(-1)?.at ?? 1, first + 1);
  const most = points.reduce(
    (top, { observed, band, whole, binomial = 0, poisson = 0 }) =>
      Math.max(top, observed, band?.[1] ?? 0, whole?.[1] ?? 0, binomial, poisson),
    1,
  );
  const still = { isAnimationActive: false, activeDot: false } as const;
  const data = points.map((point) => ({ ...point }));
  return (
    <div ref={ref}>
      <ComposedChart
        width={width}
        height={height}
        data={data}
        margin={plotMargin}
        accessibilityLayer={false}
      >
        <XAxis
          dataKey="at"
          type="number"
          scale={growing ? "log" : "linear"}
          domain={[first, last]}
          ticks={
            growing ? growingTicks(last, 1) : roundTicks(first, last, 8).filter(Number.isInteger)
          }
          tick={tickLook}
          tickLine={tickLine}
          axisLine={axisLine}
          tickFormatter={(at: number) => formatNumber(at)}
          padding={{ left: 8, right: 8 }}
          label={{
            value: atLabel,
            position: "insideBottomRight",
            offset: -14,
            fill: "var(--ink-2)",
            fontSize: 12,
          }}
        />
        <YAxis
          scale={growing ? "symlog" : "linear"}
          domain={[0, most]}
          ticks={growing ? growingTicks(most, 0) : roundTicks(0, most, 5)}
          width={52}
          tick={tickLook}
          tickLine={tickLine}
          axisLine={false}
          tickFormatter={(value: number) => formatNumber(value)}
          label={{
            value: valueLabel,
            position: "top",
            offset: 8,
            dx: 10,
            fill: "var(--ink-2)",
            fontSize: 12,
          }}
        />
        <Area
          dataKey="whole"
          {...still}
          stroke={greyed ? "var(--rule)" : "var(--ink-2)"}
          strokeDasharray="3 3"
          strokeWidth={1}
          fill="none"
        />
        <Area
          dataKey="band"
          {...still}
          stroke="none"
          fill={greyed ? "var(--paper-2)" : "var(--wash)"}
          fillOpacity={1}
        />
        <Line dataKey="binomial" {...still} stroke="var(--ochre)" strokeWidth={1.5} dot={false} />
        <Line
          dataKey="poisson"
          {...still}
          stroke="var(--ochre)"
          strokeDasharray="2 4"
          strokeWidth={1.5}
          dot={false}
        />
        <Line
          dataKey="observed"
          {...still}
          stroke="var(--kelp)"
          strokeWidth={1}
          dot={{ r: 3, fill: "var(--kelp)", stroke: "var(--paper)", strokeWidth: 1 }}
        />
      </ComposedChart>
    </div>
  );
}
