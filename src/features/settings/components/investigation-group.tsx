import { useState } from "react";
import { CheckboxField } from "../../../components/fields/checkbox-field.tsx";
import { TextField } from "../../../components/fields/text-field.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { useSettings, useSettingsDesk } from "../form/settings-desk.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { NumberSetting } from "./number-setting.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";

/** Made once: some four hundred entries that never change. */
const zones = Intl.supportedValuesOf("timeZone").map((zone) => <option key={zone} value={zone} />);

/** What the investigation is and where it is worked. */
export function InvestigationGroup() {
  const { register, formState } = useSettings();
  const { saved } = useSettingsDesk();
  // Offered once the box is used, so that the page is not weighed down by a list nobody opens.
  const [offered, setOffered] = useState(false);
  const { errors } = formState;
  const notes = SETTING_NOTES;
  return (
    <SettingGroup
      id="investigation"
      title="The investigation"
      about="What it is called, where its days begin, and how many people it is about."
    >
      <SettingRow settings={["name"]}>
        <TextField
          label={notes.name.label}
          hint={notes.name.does}
          error={fieldWords(errors.name?.message)}
          {...register("name")}
        />
      </SettingRow>
      <SettingRow settings={["invented"]}>
        <CheckboxField
          label={notes.invented.label}
          disabled={saved.practice}
          hint={
            saved.practice
              ? "An investigation to practise with is always invented."
              : notes.invented.does
          }
          error={fieldWords(errors.invented?.message)}
          {...register("invented", { disabled: false })}
        />
      </SettingRow>
      <SettingRow settings={["timeZone"]}>
        <div>
          <TextField
            label={notes.timeZone.label}
            hint={`${notes.timeZone.does} As listed by IANA, such as Europe/Lisbon.`}
            list="time-zones"
            onFocus={() => setOffered(true)}
            spellCheck={false}
            error={fieldWords(errors.timeZone?.message)}
            {...register("timeZone")}
          />
          <datalist id="time-zones">{offered ? zones : null}</datalist>
        </div>
      </SettingRow>
      <SettingRow settings={["countryCode"]}>
        <TextField
          label={notes.countryCode.label}
          hint={notes.countryCode.does}
          spellCheck={false}
          error={fieldWords(errors.countryCode?.message)}
          {...register("countryCode")}
        />
      </SettingRow>
      <SettingRow settings={["populationAtRisk"]}>
        <NumberSetting setting="populationAtRisk" />
      </SettingRow>
    </SettingGroup>
  );
}
