import { Area, ComposedChart, ReferenceArea, ReferenceLine, XAxis, YAxis } from "recharts";
import { formatNumber } from "../../../lib/formatters.ts";
import { useWidth } from "../../../lib/use-width.ts";
import type { BaselineFigure } from "../run-verdict.ts";
import { histogramOutline, histogramTable } from "./histogram-data.ts";
import { PlotFrame } from "./plot-frame.tsx";
import { axisLine, plotMargin, roundTicks, tickLine, tickLook } from "./plot-look.ts";

export type ReplicateHistogramProps = {
  label: string;
  figure: BaselineFigure;
  observed: number | null;
  decimals: number;
  /** The plain sentence under the plot, read out in its place too. */
  sentence: string;
  fileStem: string;
  greyed: boolean;
};

const height = 172;

/** Values of a measure over the random networks, with the network on record marked among them. */
export function ReplicateHistogram(props: ReplicateHistogramProps) {
  const { label, figure, observed, decimals, sentence, fileStem, greyed } = props;
  const [ref, width] = useWidth(420);
  if (figure.histogram === null) return <p>{sentence}</p>;
  const { outline, low, high } = histogramOutline(figure.histogram, observed);
  const most = Math.max(...outline.map(({ count }) => count), 1);
  const ticks = roundTicks(low, high, width < 360 ? 3 : 5);
  const atEnd = observed !== null && observed > (low + high) / 2;
  return (
    <PlotFrame
      label={label}
      summary={sentence}
      table={histogramTable(figure.histogram, observed)}
      fileStem={fileStem}
      notes={
        <p className="text-sm text-ink-2">
          <strong className="text-ink">{sentence}</strong> Shaded: the middle 95 % of the random
          networks.
        </p>
      }
    >
      <div ref={ref}>
        <ComposedChart
          width={width}
          height={height}
          data={outline}
          margin={{ ...plotMargin, bottom: 2 }}
          accessibilityLayer={false}
        >
          {figure.low !== null && figure.high !== null && figure.high > figure.low ? (
            <ReferenceArea
              x1={figure.low}
              x2={figure.high}
              fill="var(--wash)"
              fillOpacity={1}
              stroke="none"
            />
          ) : null}
          <XAxis
            dataKey="at"
            type="number"
            domain={[low, high]}
            ticks={ticks}
            tickFormatter={(at: number) => formatNumber(at, { decimals: tickPlaces(ticks) })}
            tick={tickLook}
            tickLine={tickLine}
            axisLine={axisLine}
            allowDataOverflow
          />
          <YAxis
            ticks={roundTicks(0, most, 3)}
            domain={[0, most]}
            width={44}
            tick={tickLook}
            tickLine={false}
            axisLine={false}
            tickFormatter={(count: number) => formatNumber(count)}
          />
          <Area
            dataKey="count"
            type="linear"
            isAnimationActive={false}
            stroke={greyed ? "var(--ink-2)" : "var(--ink)"}
            strokeWidth={1}
            fill={greyed ? "var(--rule)" : "var(--ink-2)"}
            fillOpacity={greyed ? 0.5 : 0.55}
            activeDot={false}
          />
          {observed === null ? null : (
            <ReferenceLine
              x={observed}
              stroke="var(--kelp)"
              strokeWidth={2}
              label={{
                value: `on record ${formatNumber(observed, { decimals })}`,
                position: atEnd ? "insideTopRight" : "insideTopLeft",
                fill: "var(--kelp)",
                fontSize: 12,
                fontWeight: 700,
                dy: -20,
                dx: atEnd ? 6 : -6,
              }}
            />
          )}
        </ComposedChart>
      </div>
    </PlotFrame>
  );
}

function tickPlaces(ticks: readonly number[]): number {
  return ticks.reduce((most, at) => Math.max(most, (String(at).split(".")[1] ?? "").length), 0);
}
