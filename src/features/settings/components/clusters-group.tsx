import { useWatch } from "react-hook-form";
import { typedNumber } from "../../../lib/typed-number.ts";
import { useSettings } from "../form/settings-desk.ts";
import { NumberSetting } from "./number-setting.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";

/** When cases are proposed as a cluster, and when one falls quiet. */
export function ClustersGroup() {
  const { control } = useSettings();
  const [closure, longest] = useWatch({ control, name: ["closureDays", "incubationMax"] });
  const max = typedNumber(longest);
  return (
    <SettingGroup
      id="clusters"
      title="Clusters"
      about="Which cases are proposed as one cluster, and after how long without a new case it is quiet."
    >
      <SettingRow settings={["clusterWindowDays", "clusterMinimumCases"]}>
        <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
          <NumberSetting setting="clusterWindowDays" />
          <NumberSetting setting="clusterMinimumCases" />
        </div>
      </SettingRow>
      <SettingRow settings={["closureDays"]}>
        <div>
          <NumberSetting setting="closureDays" />
          {closure.trim() === "" && typeof max === "number" ? (
            <p className="mt-1 text-sm">
              Blank now, so twice the longest incubation: {2 * max} days.
            </p>
          ) : null}
        </div>
      </SettingRow>
    </SettingGroup>
  );
}
