import { formatEstimate } from "../../lib/formatters.ts";
import { connectivity, halfWidth, type ThresholdInput } from "./threshold-input.ts";
import { createThresholdScale, type ThresholdScale } from "./threshold-scale.ts";

type Lanes = { giant: number; value: number; trail: number; axis: number; height: number };

/** Wide and small drawings differ in which lanes of words they have. */
const normalLanes: Lanes = { giant: 12, value: 33, trail: 50, axis: 66, height: 106 };
const smallLanes: Lanes = { giant: 0, value: 13, trail: 24, axis: 34, height: 54 };

const narrow = 560;

export type ThresholdDrawingProps = {
  input: ThresholdInput;
  width: number;
  small: boolean;
  /** The picture in words. */
  description: string;
};

/** The picture of a threshold strip in real pixels. */
export function ThresholdDrawing({ input, width, small, description }: ThresholdDrawingProps) {
  const lanes = small ? smallLanes : normalLanes;
  const lnN = connectivity(input);
  const scale = createThresholdScale(
    [
      ...(input.value === null ? [] : [input.value]),
      ...(input.interval ?? []),
      ...(input.trail ?? []).map(({ value }) => value),
      ...(lnN === null ? [] : [lnN]),
    ],
    14,
    width - 22,
  );
  return (
    <svg
      width={width}
      height={lanes.height}
      role="img"
      aria-label={description}
      className="figure-svg max-w-full"
    >
      <CriticalWindow {...{ input, scale, lanes, small }} />
      <Axis {...{ scale, lanes, small }} />
      <GiantTick {...{ scale, lanes, small, width }} />
      {lnN === null ? null : <ConnectivityLine {...{ lnN, scale, lanes, small, width }} />}
      <Trail {...{ input, scale, lanes }} />
      <Observed {...{ input, scale, lanes, width }} />
    </svg>
  );
}

type Part = { scale: ThresholdScale; lanes: Lanes; small: boolean };

function CriticalWindow({ input, scale, lanes, small }: Part & { input: ThresholdInput }) {
  const half = halfWidth(input);
  if (half === null) return null;
  const from = scale.x(1 - half);
  const to = scale.x(1 + half);
  const reach = small ? 14 : 24;
  return (
    <g>
      <rect
        x={from}
        y={lanes.axis - reach}
        width={Math.max(2, to - from)}
        height={reach * 2}
        fill="var(--wash)"
      />
      {small ? null : (
        <text x={scale.x(1)} y={lanes.axis + 38} textAnchor="middle" className="t-small">
          critical window
        </text>
      )}
    </g>
  );
}

function Axis({ scale, lanes, small }: Part) {
  return (
    <g>
      <path
        d={`M${scale.x(scale.low)} ${lanes.axis}H${scale.x(scale.high)}`}
        className="axis-strong"
      />
      <path
        d={scale.ticks.map(({ x }) => `M${x} ${lanes.axis}v5`).join("")}
        stroke="var(--ink)"
        fill="none"
      />
      {scale.ticks.map(({ value, x, label }) => (
        <text
          key={value}
          // The 1 stands beside its own tall tick rather than under it.
          x={value === 1 ? x + 5 : x}
          y={lanes.axis + (small ? 17 : 19)}
          textAnchor={value === 1 ? "start" : "middle"}
          className="t-quiet t-small"
        >
          {label}
        </text>
      ))}
    </g>
  );
}

function GiantTick({ scale, lanes, small, width }: Part & { width: number }) {
  const x = scale.x(1);
  const reach = small ? 14 : 24;
  return (
    <g>
      <path
        d={`M${x} ${lanes.axis - reach}V${lanes.axis + reach}`}
        stroke="var(--ink)"
        strokeWidth={2}
        fill="none"
      />
      {small ? null : (
        <text
          x={width < narrow ? Math.max(x, 104) : x}
          y={lanes.giant}
          textAnchor="middle"
          className="t-small"
        >
          giant component: 1 pair, p = 1/n
        </text>
      )}
    </g>
  );
}

function ConnectivityLine({
  lnN,
  scale,
  lanes,
  small,
  width,
}: Part & { lnN: number; width: number }) {
  const x = scale.x(lnN);
  // On a phone the words of both thresholds would meet above the axis; this one goes below.
  const below = width < narrow;
  const label = below ? "all connected" : "all connected, ln n";
  const anchor = x > width - 70 ? "end" : "middle";
  return (
    <g>
      <path
        d={`M${x} ${small ? lanes.axis - 14 : below ? lanes.axis - 24 : lanes.giant + 6}V${lanes.axis + (small ? 14 : 24)}`}
        className="dotted"
      />
      {small ? null : (
        <text
          x={x}
          y={below ? lanes.axis + 38 : lanes.giant}
          textAnchor={anchor}
          className="t-quiet t-small"
        >
          {label}
        </text>
      )}
    </g>
  );
}

function Trail({ input, scale, lanes }: Omit<Part, "small"> & { input: ThresholdInput }) {
  const trail = input.trail ?? [];
  return (
    <g fill="var(--kelp)">
      {trail.map(({ day, value }, index) => (
        <circle
          key={day}
          cx={scale.x(value)}
          cy={lanes.trail}
          r={2}
          // Older days fade, so that the way to today can be followed.
          opacity={0.35 + (0.65 * (index + 1)) / trail.length}
        />
      ))}
    </g>
  );
}

function Observed({
  input,
  scale,
  lanes,
  width,
}: Omit<Part, "small"> & { input: ThresholdInput; width: number }) {
  if (input.value === null) {
    return (
      <text x={scale.x(scale.low)} y={lanes.value} className="t-quiet" fontStyle="italic">
        {input.reason ?? "no value"}
      </text>
    );
  }
  const x = scale.x(input.value);
  const hollow = input.hasVerdict === false;
  const label = formatEstimate(input.value, input.interval);
  const anchor = x > width - 150 ? "end" : "start";
  return (
    <g>
      {input.interval ? (
        <rect
          x={scale.x(input.interval[0])}
          y={lanes.axis - 4}
          width={Math.max(2, scale.x(input.interval[1]) - scale.x(input.interval[0]))}
          height={8}
          fill={hollow ? "none" : "var(--kelp)"}
          fillOpacity={0.5}
          stroke={hollow ? "var(--kelp)" : "none"}
          strokeDasharray={hollow ? "3 2" : undefined}
        />
      ) : null}
      <circle
        cx={x}
        cy={lanes.axis}
        r={6}
        fill={hollow ? "var(--paper)" : "var(--kelp)"}
        stroke={hollow ? "var(--kelp)" : "var(--paper)"}
        strokeWidth={hollow ? 2 : 1.5}
      />
      <text
        x={anchor === "end" ? Math.min(x + 8, width - 2) : Math.max(2, x - 6)}
        y={lanes.value}
        textAnchor={anchor}
        className="t-kelp t-rim"
        fontWeight={700}
      >
        {label}
      </text>
    </g>
  );
}
