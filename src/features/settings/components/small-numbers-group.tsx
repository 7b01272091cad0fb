import { NumberSetting } from "./number-setting.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";

/** Below which count a table that leaves the team stays silent. */
export function SmallNumbersGroup() {
  return (
    <SettingGroup
      id="small-numbers"
      title="Small numbers"
      about="Below which count a table that leaves the team says nothing."
    >
      <SettingRow settings={["smallCellThreshold"]}>
        <NumberSetting setting="smallCellThreshold" />
      </SettingRow>
    </SettingGroup>
  );
}
