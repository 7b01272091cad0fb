import type { ReactNode } from "react";
import type { SettingKey } from "../../../../shared/contracts/settings.ts";
import { Button } from "../../../components/ui/button.tsx";
import { useSettingsDesk } from "../form/settings-desk.ts";
import { SETTING_NOTES, settingLabel } from "../setting-notes.ts";
import { settingValueWords } from "../setting-words.ts";

export type SettingRowProps = {
  /** One setting, or a pair that is read together. */
  settings: readonly SettingKey[];
  /** The boxes; for roles that only read, the saved values stand instead. */
  children: ReactNode;
  /** How the saved value is read, where words alone are not enough. */
  reading?: ReactNode;
};

/** Settings with their boxes at the start and what is to be known about them beside. */
export function SettingRow({ settings, children, reading }: SettingRowProps) {
  const { readOnly, changed } = useSettingsDesk();
  return (
    <div className="grid gap-x-10 gap-y-3 border-b border-rule py-4 first:pt-1 last:border-b-0 lg:grid-cols-[minmax(0,31rem)_minmax(0,1fr)]">
      <div className="min-w-0 space-y-3">
        {readOnly ? (reading ?? settings.map((one) => <Reading key={one} setting={one} />)) : null}
        {readOnly ? null : children}
        {settings
          .filter((one) => changed.has(one))
          .map((one) => (
            <ChangedLine key={one} setting={one} named={settings.length > 1} />
          ))}
      </div>
      <SettingNotes settings={settings} />
    </div>
  );
}

function Reading({ setting }: { setting: SettingKey }) {
  const { saved } = useSettingsDesk();
  return (
    <div>
      <h3 className="text-sm">{settingLabel(setting)}</h3>
      <p className="whitespace-pre-wrap wrap-anywhere">
        {settingValueWords(setting, saved[setting])}
        {setting === "closureDays" && saved.closureDays === null
          ? ` (${saved.closureDaysInForce} days)`
          : ""}
      </p>
      <p className="mt-0.5 text-sm text-ink-2">{SETTING_NOTES[setting].does}</p>
    </div>
  );
}

const longestValue = 90;

function ChangedLine({ setting, named }: { setting: SettingKey; named: boolean }) {
  const { saved, putBack } = useSettingsDesk();
  const words = settingValueWords(setting, saved[setting]).replaceAll("\n", "; ");
  const label = settingLabel(setting);
  return (
    <p className="flex flex-wrap items-baseline gap-x-3 gap-y-1 border-s-2 border-ochre ps-2 text-sm">
      <span className="min-w-0 wrap-anywhere">
        <strong className="text-ochre">
          {named ? `${label}: not saved yet.` : "Not saved yet."}
        </strong>{" "}
        Saved: {words.length > longestValue ? `${words.slice(0, longestValue)}…` : words}
      </span>
      <Button variant="plain" size="small" onClick={() => putBack(setting)}>
        Put back <span className="sr-only">{label}</span>
      </Button>
    </p>
  );
}

function SettingNotes({ settings }: { settings: readonly SettingKey[] }) {
  const uses = settings.flatMap((one) => SETTING_NOTES[one].uses ?? []);
  const examples = settings.flatMap((one) => SETTING_NOTES[one].examples ?? []);
  return (
    <div className="min-w-0 space-y-2 text-sm text-ink-2">
      {uses.map((words) => (
        <p key={words}>
          <strong className="text-ink">Used by</strong>: {words}
        </p>
      ))}
      {examples.length > 0 ? (
        <div>
          <p>
            <strong className="text-ink">Published examples</strong>, no advice: local public-health
            law and guidance decide.
          </p>
          <ul className="mt-0.5 list-disc space-y-0.5 ps-4 marker:text-rule">
            {examples.map((one) => (
              <li key={one}>{one}</li>
            ))}
          </ul>
        </div>
      ) : null}
    </div>
  );
}
