/** The two themes a page can be drawn in. */
export type Theme = "light" | "dark";

/** Colours of one theme; meanings are in tokens.css. */
export type Tokens = Readonly<
  Record<
    | "paper"
    | "paper-2"
    | "ink"
    | "ink-2"
    | "rule"
    | "kelp"
    | "coral"
    | "ochre"
    | "blue"
    | "wash"
    | "seen",
    string
  >
>;

/** The same values as tokens.css, for what cannot read CSS variables (canvas, blob pictures). */
export const tokens: Readonly<Record<Theme, Tokens>> = {
  light: {
    paper: "#fbfaf6",
    "paper-2": "#f2f0e8",
    ink: "#14262b",
    "ink-2": "#4a5b60",
    rule: "#c6ccc7",
    kelp: "#0b665c",
    coral: "#a8321a",
    ochre: "#7a5200",
    blue: "#285a88",
    wash: "#e9e2cb",
    seen: "#0b665c",
  },
  dark: {
    paper: "#0f1b1f",
    "paper-2": "#16262b",
    ink: "#e9eeeb",
    "ink-2": "#a9b7b5",
    rule: "#31454b",
    kelp: "#5fcbb8",
    coral: "#ff8c6e",
    ochre: "#e5b75a",
    blue: "#8fbbea",
    wash: "#2a2f22",
    seen: "#5fcbb8",
  },
};
