import { useEffect, useState } from "react";
import type { Theme } from "../styles/tokens.ts";

/** What the reader chose; `system` follows the device. */
export type ThemeChoice = "system" | Theme;

const key = "strandline.theme";
const changed = "strandline:theme";

/** The remembered choice; `system` when none is kept or storage is closed. */
export function readThemeChoice(): ThemeChoice {
  try {
    const kept = localStorage.getItem(key);
    return kept === "light" || kept === "dark" ? kept : "system";
  } catch {
    return "system";
  }
}

/** Applies and remembers a choice; it holds for this page even where it cannot be remembered. */
export function setThemeChoice(choice: ThemeChoice): void {
  if (choice === "system") document.documentElement.removeAttribute("data-theme");
  else document.documentElement.setAttribute("data-theme", choice);
  try {
    if (choice === "system") localStorage.removeItem(key);
    else localStorage.setItem(key, choice);
  } catch {
    // Closed storage: the attribute alone keeps the choice until the page is left.
  }
  window.dispatchEvent(new Event(changed));
}

/** The theme the page is drawn in now, for what is painted without CSS (canvas, blob pictures). */
export function currentTheme(): Theme {
  const set = document.documentElement.getAttribute("data-theme");
  if (set === "light" || set === "dark") return set;
  return window.matchMedia?.("(prefers-color-scheme: dark)").matches ? "dark" : "light";
}

/** The theme in force, following both the reader's choice and the device. */
export function useTheme(): Theme {
  const [theme, setTheme] = useState<Theme>(currentTheme);
  useEffect(() => {
    const update = () => setTheme(currentTheme());
    const media = window.matchMedia?.("(prefers-color-scheme: dark)");
    media?.addEventListener("change", update);
    window.addEventListener(changed, update);
    return () => {
      media?.removeEventListener("change", update);
      window.removeEventListener(changed, update);
    };
  }, []);
  return theme;
}
