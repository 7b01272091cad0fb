import type { ElementDefinition, StylesheetJsonBlock } from "cytoscape";
import type { NetworkGraph } from "../../../shared/contracts/network.ts";
import { groupColors } from "../../components/person-mark/group-colors.ts";
import type { PersonMarkInput } from "../../components/person-mark/person-mark-input.ts";
import { type Theme, tokens } from "../../styles/tokens.ts";
import type { PictureNode } from "./picture-nodes.ts";

export type PictureLook = {
  theme: Theme;
  /** Address of a mark as a picture. */
  markUrl: (mark: PersonMarkInput) => string;
};

/** Side of a person's mark, in the units of the server's positions (neighbours stand 40 apart). */
const markSide = 22;
const smallestDisc = 14;

/** What the drawing library takes: nodes at the server's positions, one line a contact pair. */
export function pictureElements(
  nodes: readonly PictureNode[],
  pairs: NetworkGraph["pairs"],
  { theme, markUrl }: PictureLook,
): ElementDefinition[] {
  const drawn = nodes.map((node): ElementDefinition => {
    const { id, label, x, y, size, level, color } = node;
    const look =
      level === "people"
        ? { side: markSide, mark: markUrl(node.mark) }
        : { ...discOf(size), fill: fillOf(color, theme) };
    return {
      group: "nodes",
      classes: level,
      data: { id, label: level === "people" ? label : `${label} · ${size}`, ...look },
      position: { x, y },
    };
  });
  const lines = pairs.map(
    ({ id, source, target }): ElementDefinition => ({
      group: "edges",
      data: { id, source, target },
    }),
  );
  return [...drawn, ...lines];
}

/** A disc whose area is its people; its words grow with it, to be read when all are in sight. */
function discOf(size: number) {
  const side = Math.max(smallestDisc, markSide * Math.sqrt(size));
  return { side, letters: Math.max(11, side / 5) };
}

function fillOf(color: number | "rest", theme: Theme): string {
  return (color === "rest" ? undefined : groupColors[theme][color]) ?? tokens[theme]["ink-2"];
}

/** The look of the picture in one theme; a canvas cannot read the page's CSS. */
export function pictureStyle(theme: Theme): StylesheetJsonBlock[] {
  const { ink, paper, blue, "ink-2": quiet } = tokens[theme];
  return [
    {
      selector: "node",
      style: {
        width: "data(side)",
        height: "data(side)",
        label: "data(label)",
        color: ink,
        "font-family": '"Atkinson Hyperlegible", system-ui, sans-serif',
        "font-size": 8,
        // Names of people appear once one is near enough to read them.
        "min-zoomed-font-size": 9,
        "text-valign": "bottom",
        "text-margin-y": 2,
        "text-outline-color": paper,
        "text-outline-width": 2,
        "overlay-opacity": 0,
      },
    },
    {
      selector: "node.people",
      style: {
        "background-opacity": 0,
        "background-image": "data(mark)",
        "background-fit": "contain",
        "background-clip": "none",
        "border-width": 0,
      },
    },
    {
      selector: "node.groups",
      style: {
        "background-color": "data(fill)",
        "border-color": ink,
        "border-width": 1.5,
        "font-size": "data(letters)",
        "min-zoomed-font-size": 8,
      },
    },
    {
      selector: "edge",
      style: {
        width: 1,
        "line-color": quiet,
        // The one kind of line that stays quick with thousands of them.
        "curve-style": "haystack",
        "overlay-opacity": 0,
      },
    },
    {
      selector: "node:selected",
      style: {
        "overlay-color": blue,
        "overlay-opacity": 0.3,
        "overlay-padding": 8,
        "overlay-shape": "ellipse",
        "font-weight": "bold",
        "z-index": 10,
      },
    },
    { selector: "node.people:selected", style: { "font-size": 20, "min-zoomed-font-size": 0 } },
  ];
}
