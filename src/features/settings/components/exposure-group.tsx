import { useWatch } from "react-hook-form";
import { SETTINGS } from "../../../../shared/vocabulary.ts";
import { NumberField } from "../../../components/fields/number-field.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { typedNumber } from "../../../lib/typed-number.ts";
import { settingWords } from "../../../lib/words.ts";
import { useSettings } from "../form/settings-desk.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { gradingSentence } from "../setting-words.ts";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";

/** What makes a contact high-risk. */
export function ExposureGroup() {
  return (
    <SettingGroup
      id="exposure"
      title="Exposure grading"
      about="What makes a contact high-risk rather than low-risk."
    >
      <SettingRow settings={["exposureGrading"]}>
        <GradingEditor />
      </SettingRow>
    </SettingGroup>
  );
}

function GradingEditor() {
  const { register, control, formState } = useSettings();
  const grading = useWatch({ control, name: "exposureGrading" });
  const errors = formState.errors.exposureGrading;
  const read = (text: string) => typedNumber(text) ?? "";
  const sentence = gradingSentence({
    ...grading,
    highSettings: SETTINGS.filter((setting) => grading.highSettings.includes(setting)),
    highMinutes: read(grading.highMinutes),
    highDistanceM: read(grading.highDistanceM),
  });
  return (
    <div className="space-y-3">
      <div>
        <p className="text-sm font-bold">What makes it high-risk</p>
        <p className="text-sm text-ink-2">{SETTING_NOTES.exposureGrading.does}</p>
      </div>
      <label className="flex min-h-9 items-center gap-2">
        <input type="checkbox" {...register("exposureGrading.physicalIsHigh")} />
        direct physical contact
      </label>
      <fieldset>
        <legend className="mb-1 text-sm font-bold">Any exposure in the setting</legend>
        <div className="flex flex-wrap gap-x-5">
          {SETTINGS.map((setting) => (
            <label key={setting} className="inline-flex min-h-9 items-center gap-2">
              <input
                type="checkbox"
                value={setting}
                {...register("exposureGrading.highSettings")}
              />
              {settingWords[setting]}
            </label>
          ))}
        </div>
      </fieldset>
      <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
        <NumberField
          label="At least this long"
          unit="minutes"
          whole
          error={fieldWords(errors?.highMinutes?.message)}
          {...register("exposureGrading.highMinutes")}
        />
        <NumberField
          label="No further apart than"
          unit="metres"
          hint="Both together: this long and this near."
          error={fieldWords(errors?.highDistanceM?.message)}
          {...register("exposureGrading.highDistanceM")}
        />
      </div>
      <p aria-live="polite" className="border-s-2 border-rule ps-3">
        {sentence}
      </p>
    </div>
  );
}
