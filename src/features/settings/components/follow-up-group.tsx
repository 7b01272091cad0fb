import { NumberSetting } from "./number-setting.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";
import { SymptomEditor } from "./symptom-editor.tsx";

/** How contacts are followed, and what they are asked. */
export function FollowUpGroup() {
  return (
    <SettingGroup
      id="follow-up"
      title="Follow-up"
      about="When a contact counts as lost, and which symptoms are asked about."
    >
      <SettingRow settings={["lostAfterDays"]}>
        <NumberSetting setting="lostAfterDays" />
      </SettingRow>
      <SettingRow settings={["symptoms"]}>
        <SymptomEditor />
      </SettingRow>
    </SettingGroup>
  );
}
