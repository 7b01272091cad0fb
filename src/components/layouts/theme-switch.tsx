import { useState } from "react";
import { readThemeChoice, setThemeChoice, type ThemeChoice } from "../../lib/theme.ts";
import { MenuSelect } from "../ui/menu-select.tsx";

const options = [
  { value: "system", label: "As the device" },
  { value: "light", label: "Light" },
  { value: "dark", label: "Dark" },
] as const satisfies readonly { value: ThemeChoice; label: string }[];

/** Light, dark, or as the device has it; remembered in this browser. */
export function ThemeSwitch({ hideLabel = false }: { hideLabel?: boolean }) {
  const [choice, setChoice] = useState<ThemeChoice>(readThemeChoice);
  return (
    <MenuSelect<ThemeChoice>
      label="Theme"
      hideLabel={hideLabel}
      options={options}
      value={choice}
      onValueChange={(next) => {
        setThemeChoice(next);
        setChoice(next);
      }}
    />
  );
}
