import { createContext, useContext } from "react";
import { type UseFormReturn, useFormState } from "react-hook-form";
import type { SettingKey, Settings, SettingsPatch } from "../../../../shared/contracts/settings.ts";
import type { SettingsValues } from "./setting-values.ts";

export type SettingsFormOf = UseFormReturn<SettingsValues, unknown, SettingsPatch>;

/** What the rows of the settings page share. It stays the same object while one types in a box. */
export type SettingsDesk = {
  form: SettingsFormOf;
  /** The settings in force. */
  saved: Settings;
  /** The acting role may read only. */
  readOnly: boolean;
  changed: ReadonlySet<string>;
  putBack: (setting: SettingKey) => void;
};

export const SettingsDeskContext = createContext<SettingsDesk | null>(null);

/** The settings page around a row. Throws outside of it. */
export function useSettingsDesk(): SettingsDesk {
  const desk = useContext(SettingsDeskContext);
  if (!desk) throw new Error("useSettingsDesk is used outside of the settings page");
  return desk;
}

/** The one form of the settings page, with its errors; values are watched where they are shown. */
export function useSettings() {
  const { register, control, getValues } = useSettingsDesk().form;
  const { errors } = useFormState({ control });
  return { register, control, getValues, formState: { errors } };
}
