import { coloredGroups } from "./group-colors.ts";
import type { PersonMarkInput } from "./person-mark-input.ts";

/** The colours a mark is drawn with: CSS variables in the page, hex values in a picture. */
export type MarkPaint = {
  ink: string;
  /** Second ink: rest groups and what is not done yet. */
  quiet: string;
  paper: string;
  groups: readonly string[];
};

/** One SVG shape; attribute names as in React. */
export type MarkPart = { tag: "circle" | "path"; attributes: Record<string, string | number> };

const centre = 12;
const ringRadius = 7.5;
const circumference = 2 * Math.PI * ringRadius;

/** The shapes of a mark in a 24 × 24 box, back to front: one geometry for page and picture. */
export function markParts(input: PersonMarkInput, paint: MarkPaint): MarkPart[] {
  const color = markColor(input, paint);
  if (input.classification === "contact") return ring(input, paint, color);
  if (input.classification === "not_a_case") {
    return [
      circle(ringRadius, { fill: paint.paper, stroke: paint.quiet, strokeWidth: 1.5 }),
      path("M8.5 12h7", { stroke: paint.quiet, strokeWidth: 1.75 }),
    ];
  }
  if (!input.wasContact) return disc(input.classification, 8, paint, color);
  return [
    circle(9.75, { fill: paint.paper, stroke: paint.ink, strokeWidth: 1.5 }),
    ...disc(input.classification, 5.75, paint, color),
  ];
}

function markColor({ group }: PersonMarkInput, paint: MarkPaint): string {
  if (group === undefined) return paint.ink;
  if (group === "rest" || group >= coloredGroups) return paint.quiet;
  return paint.groups[group] ?? paint.quiet;
}

function disc(
  classification: "confirmed" | "probable" | "suspected",
  radius: number,
  paint: MarkPaint,
  color: string,
): MarkPart[] {
  const outline = { stroke: paint.ink, strokeWidth: 1.5 };
  if (classification === "confirmed") return [circle(radius, { fill: color, ...outline })];
  const open = circle(radius, { fill: paint.paper, ...outline });
  if (classification === "suspected") {
    return [open, circle(radius * 0.38, { fill: color, stroke: paint.ink, strokeWidth: 0.75 })];
  }
  const half = `M12 ${centre - radius}A${radius} ${radius} 0 0 1 12 ${centre + radius}Z`;
  return [open, path(half, { fill: color, stroke: paint.ink, strokeWidth: 1 })];
}

function ring({ followUp }: PersonMarkInput, paint: MarkPaint, color: string): MarkPart[] {
  if (!followUp) {
    return [
      circle(ringRadius, { fill: paint.paper, stroke: paint.ink, strokeWidth: 3.5 }),
      circle(ringRadius, { fill: "none", stroke: color, strokeWidth: 1.75 }),
    ];
  }
  if (followUp.state === "lost") return brokenRing(paint, color);
  if (followUp.state === "ended") {
    // The share done stays as it was; a square stop stands inside.
    const { share } = followUp;
    return [
      ...ring({ classification: "contact", followUp: { share, state: "active" } }, paint, color),
      path("M9.25 9.25h5.5v5.5h-5.5Z", { fill: paint.ink, stroke: "none" }),
    ];
  }
  const share = followUp.state === "completed" ? 1 : Math.min(1, Math.max(0, followUp.share));
  const track = circle(ringRadius, { fill: paint.paper, stroke: paint.quiet, strokeWidth: 1.25 });
  if (share === 0) return [track];
  if (share === 1) {
    return [
      circle(ringRadius, { fill: paint.paper, stroke: paint.ink, strokeWidth: 5.5 }),
      circle(ringRadius, { fill: "none", stroke: color, strokeWidth: 3.5 }),
    ];
  }
  // The colour stops a little short at both ends, so that the ink shows all round it.
  const lip = 1 / circumference;
  return [
    track,
    path(arc(0, share), { stroke: paint.ink, strokeWidth: 5.5 }),
    ...(share > 3 * lip ? [path(arc(lip, share - lip), { stroke: color, strokeWidth: 3.5 })] : []),
  ];
}

function brokenRing(paint: MarkPaint, color: string): MarkPart[] {
  const period = circumference / 6;
  const dash = period * 0.66;
  const lip = 0.8;
  return [
    circle(ringRadius, { fill: paint.paper, stroke: "none" }),
    circle(ringRadius, {
      fill: "none",
      stroke: paint.ink,
      strokeWidth: 4,
      strokeDasharray: `${round(dash)} ${round(period - dash)}`,
    }),
    circle(ringRadius, {
      fill: "none",
      stroke: color,
      strokeWidth: 2.25,
      strokeDasharray: `${round(dash - 2 * lip)} ${round(period - dash + 2 * lip)}`,
      strokeDashoffset: -lip,
    }),
  ];
}

/** An arc of the ring from one share to another, clockwise from the top. */
function arc(from: number, to: number): string {
  const point = (share: number) => {
    const angle = 2 * Math.PI * share;
    const x = centre + ringRadius * Math.sin(angle);
    const y = centre - ringRadius * Math.cos(angle);
    return `${round(x)} ${round(y)}`;
  };
  const large = to - from > 0.5 ? 1 : 0;
  return `M${point(from)}A${ringRadius} ${ringRadius} 0 ${large} 1 ${point(to)}`;
}

function circle(r: number, attributes: MarkPart["attributes"]): MarkPart {
  return { tag: "circle", attributes: { cx: centre, cy: centre, r, ...attributes } };
}

function path(d: string, attributes: MarkPart["attributes"]): MarkPart {
  return { tag: "path", attributes: { d, fill: "none", ...attributes } };
}

function round(value: number): number {
  return Math.round(value * 100) / 100;
}
