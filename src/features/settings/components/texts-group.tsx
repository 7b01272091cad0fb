import { useSettingsDesk } from "../form/settings-desk.ts";
import { languageName } from "../language-name.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { textKindWords } from "../setting-words.ts";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";
import { TextsEditor } from "./texts-editor.tsx";

/** Wording for the people who are asked and advised. */
export function TextsGroup() {
  return (
    <SettingGroup
      id="texts"
      title="Texts"
      about="Advice and consent as they were approved here, in each language that is needed."
    >
      <SettingRow settings={["texts"]} reading={<TextsReading />}>
        <TextsEditor />
      </SettingRow>
    </SettingGroup>
  );
}

function TextsReading() {
  const { texts } = useSettingsDesk().saved;
  if (texts.length === 0) return <p>No texts are kept here yet.</p>;
  return (
    <>
      <p className="text-sm text-ink-2">{SETTING_NOTES.texts.does}</p>
      {texts.map(({ kind, language, text }) => (
        <div key={`${kind} ${language}`}>
          <h3 className="text-sm">
            {textKindWords[kind]} in {languageName(language)}
          </h3>
          <p lang={language} dir="auto" className="whitespace-pre-wrap wrap-anywhere">
            {text}
          </p>
        </div>
      ))}
    </>
  );
}
