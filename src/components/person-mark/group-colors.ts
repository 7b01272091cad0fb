import type { Theme } from "../../styles/tokens.ts";

/**
 * Colours of groups, from Paul Tol's published "muted" scheme (Colour Schemes, SRON/EPS/TN/09-002,
 * issue 3.2). Place for place the same hue in both themes, but for the first: indigo is lost on a
 * dark ground and cyan takes its place. Six at most, so that each can still be told apart; further
 * groups are grey. The same values are --group-1 … --group-6 in tokens.css; a test keeps them equal.
 */
export const groupColors: Readonly<Record<Theme, readonly string[]>> = {
  light: ["#332288", "#cc6677", "#44aa99", "#ddcc77", "#aa4499", "#999933"],
  dark: ["#88ccee", "#cc6677", "#44aa99", "#ddcc77", "#aa4499", "#999933"],
};

/** How many groups get a colour of their own. */
export const coloredGroups = 6;
