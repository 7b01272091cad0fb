import type { SettingKey } from "../../../../shared/contracts/settings.ts";
import { settingValueWords } from "../setting-words.ts";

const longest = 280;

/** A value of a setting inside a table; long texts are cut and open on request. */
export function ChangeValue({ setting, value }: { setting: SettingKey; value: unknown }) {
  const words = settingValueWords(setting, value);
  if (words.length <= longest) return <span className="whitespace-pre-wrap">{words}</span>;
  return (
    <details>
      <summary className="min-h-6">{words.slice(0, longest / 2)}…</summary>
      <p className="mt-1 whitespace-pre-wrap">{words}</p>
    </details>
  );
}
