import type { Config } from "tailwindcss";

const token = (name: string) => `var(--${name})`;

/**
 * Colours are only those of the look: each is a CSS variable of src/styles/tokens.css, so a theme
 * switch needs no second class. The stock palette is left out on purpose, one cannot stray into it.
 */
export default {
  content: ["./index.html", "./src/**/*.{ts,tsx}"],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      paper: token("paper"),
      "paper-2": token("paper-2"),
      ink: token("ink"),
      "ink-2": token("ink-2"),
      rule: token("rule"),
      kelp: token("kelp"),
      coral: token("coral"),
      ochre: token("ochre"),
      blue: token("blue"),
      wash: token("wash"),
      seen: token("seen"),
    },
    extend: {
      fontFamily: {
        sans: ['"Atkinson Hyperlegible"', "system-ui", "sans-serif"],
      },
    },
  },
} satisfies Config;
