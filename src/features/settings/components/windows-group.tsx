import { NumberSetting } from "./number-setting.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";
import { WindowsStrip } from "./windows-strip.tsx";

/** Which days matter around an onset. */
export function WindowsGroup() {
  return (
    <SettingGroup
      id="windows"
      title="Windows"
      about="Which days around an onset count: where it came from, whom it may reach, how long contacts are seen."
    >
      <SettingRow settings={["incubationMin", "incubationMax"]}>
        <Pair>
          <NumberSetting setting="incubationMin" />
          <NumberSetting setting="incubationMax" />
        </Pair>
      </SettingRow>
      <SettingRow settings={["infectiousBefore", "infectiousAfter"]}>
        <Pair>
          <NumberSetting setting="infectiousBefore" />
          <NumberSetting setting="infectiousAfter" />
        </Pair>
      </SettingRow>
      <SettingRow settings={["monitoringDays"]}>
        <NumberSetting setting="monitoringDays" />
      </SettingRow>
      <WindowsStrip />
    </SettingGroup>
  );
}

function Pair({ children }: { children: React.ReactNode }) {
  return <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">{children}</div>;
}
