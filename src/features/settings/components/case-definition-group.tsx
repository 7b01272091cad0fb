import { TextareaField } from "../../../components/fields/textarea-field.tsx";
import { fieldWords } from "../../../lib/form-errors.ts";
import { useSettings } from "../form/settings-desk.ts";
import { SETTING_NOTES } from "../setting-notes.ts";
import { CaseRulesEditor } from "./case-rules-editor.tsx";
import { DefinitionVersions } from "./definition-versions.tsx";
import { SettingGroup } from "./setting-group.tsx";
import { SettingRow } from "./setting-row.tsx";

/** Who counts as a case, and what that was before. */
export function CaseDefinitionGroup() {
  const { register, formState } = useSettings();
  return (
    <SettingGroup
      id="case-definition"
      title="Case definition"
      about="Who counts as a case. Versioned: nothing that was decided is decided anew."
    >
      <SettingRow settings={["caseDefinition"]}>
        <TextareaField
          label={SETTING_NOTES.caseDefinition.label}
          hint={SETTING_NOTES.caseDefinition.does}
          rows={6}
          error={fieldWords(formState.errors.caseDefinition?.message)}
          {...register("caseDefinition")}
        />
      </SettingRow>
      <SettingRow settings={["caseRules"]}>
        <CaseRulesEditor />
      </SettingRow>
      <DefinitionVersions />
    </SettingGroup>
  );
}
