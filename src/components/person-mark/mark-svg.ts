import { type Theme, tokens } from "../../styles/tokens.ts";
import { groupColors } from "./group-colors.ts";
import { markParts } from "./mark-parts.ts";
import type { PersonMarkInput } from "./person-mark-input.ts";

/** Shares are rounded to this many steps, so that a network of thousands needs few pictures. */
const shareSteps = 20;

/** A mark as a standalone SVG text, for pictures that cannot read the page's CSS. */
export function markSvg(input: PersonMarkInput, theme: Theme): string {
  const { ink, paper, "ink-2": quiet } = tokens[theme];
  const parts = markParts(rounded(input), { ink, paper, quiet, groups: groupColors[theme] });
  const shapes = parts.map(({ tag, attributes }) => {
    const written = Object.entries(attributes).map(
      ([name, value]) => `${name.replace(/[A-Z]/g, (c) => `-${c.toLowerCase()}`)}="${value}"`,
    );
    return `<${tag} ${written.join(" ")}/>`;
  });
  return (
    '<svg xmlns="http://www.w3.org/2000/svg" width="96" height="96" viewBox="0 0 24 24">' +
    `${shapes.join("")}</svg>`
  );
}

const blobUrls = new Map<string, string>();

/**
 * Address of a mark as a picture, for the nodes of the network. A blob, because the
 * content-security policy allows no data addresses; one blob a look, kept for the life of the page.
 */
export function markBlobUrl(input: PersonMarkInput, theme: Theme): string {
  const svg = markSvg(input, theme);
  const kept = blobUrls.get(svg);
  if (kept) return kept;
  const url = URL.createObjectURL(new Blob([svg], { type: "image/svg+xml" }));
  blobUrls.set(svg, url);
  return url;
}

function rounded(input: PersonMarkInput): PersonMarkInput {
  if (!input.followUp) return input;
  const share = Math.round(input.followUp.share * shareSteps) / shareSteps;
  return { ...input, followUp: { ...input.followUp, share } };
}
