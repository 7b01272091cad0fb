import { NumberField } from "../../../components/fields/number-field.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import type { NumberSetting as Key } from "../form/setting-values.ts";
import { useSettings } from "../form/settings-desk.ts";
import { SETTING_NOTES } from "../setting-notes.ts";

/** The box of a setting that is one whole number. */
export function NumberSetting({ setting }: { setting: Key }) {
  const { register, formState } = useSettings();
  const { label, unit, does } = SETTING_NOTES[setting];
  return (
    <NumberField
      label={label}
      unit={unit}
      hint={does}
      whole
      error={fieldWords(formState.errors[setting]?.message)}
      {...register(setting)}
    />
  );
}
