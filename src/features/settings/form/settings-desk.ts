import { createContext, useContext } from "react";
import { useFormContext } from "react-hook-form";
import type { SettingKey, Settings, SettingsPatch } from "../../../../shared/contracts/settings.ts";
import type { SettingsValues } from "./setting-values.ts";

/** What the rows of the settings page share. */
export type SettingsDesk = {
  /** The settings in force. */
  saved: Settings;
  /** The acting role may read only. */
  readOnly: boolean;
  changed: ReadonlySet<SettingKey>;
  putBack: (setting: SettingKey) => void;
};

export const SettingsDeskContext = createContext<SettingsDesk | null>(null);

/** The settings page around a row. Throws outside of it. */
export function useSettingsDesk(): SettingsDesk {
  const desk = useContext(SettingsDeskContext);
  if (!desk) throw new Error("useSettingsDesk is used outside of the settings page");
  return desk;
}

/** The one form of the settings page. */
export function useSettings() {
  return useFormContext<SettingsValues, unknown, SettingsPatch>();
}
