import { memo, useMemo } from "react";
import type { Settings } from "../../../../shared/contracts/settings.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { SettingsDeskContext } from "../form/settings-desk.ts";
import { useSettingsForm } from "../form/use-settings-form.ts";
import { CaseDefinitionGroup } from "./case-definition-group.tsx";
import { ClashNotice } from "./clash-notice.tsx";
import { ClustersGroup } from "./clusters-group.tsx";
import { ExposureGroup } from "./exposure-group.tsx";
import { FollowUpGroup } from "./follow-up-group.tsx";
import { InvestigationGroup } from "./investigation-group.tsx";
import { PreviewSection } from "./preview-section.tsx";
import { SaveBar } from "./save-bar.tsx";
import { SmallNumbersGroup } from "./small-numbers-group.tsx";
import { TextsGroup } from "./texts-group.tsx";
import { WindowsGroup } from "./windows-group.tsx";

export type SettingsFormProps = {
  investigationId: string;
  saved: Settings;
  /** The acting role may read only. */
  readOnly: boolean;
};

/** Apart, so that a key in one box does not draw the whole page again. */
const Groups = memo(function Groups() {
  return (
    <>
      <InvestigationGroup />
      <CaseDefinitionGroup />
      <WindowsGroup />
      <FollowUpGroup />
      <ClustersGroup />
      <ExposureGroup />
      <SmallNumbersGroup />
      <TextsGroup />
    </>
  );
});

/** All settings in one form, grouped by what people decide; read as words by the other roles. */
export function SettingsForm({ investigationId, saved, readOnly }: SettingsFormProps) {
  const toast = useToast();
  const desk = useSettingsForm(investigationId, saved);
  const { form, base, values, changed, begun, shown, preview, patch } = desk;
  const error = patch.error ?? preview.error;
  const hint =
    Object.keys(form.formState.errors).length > 0
      ? "Look at the boxes marked “Check”."
      : shown
        ? "What would move is shown above."
        : desk.outdated
          ? "Changed since you looked; see again what would move, then save."
          : "See what would move, then save.";

  const { putBack } = desk;
  const changedWords = changed.join(" ");
  const shared = useMemo(
    () => ({ form, saved: base, readOnly, changed: new Set(changedWords.split(" ")), putBack }),
    [form, base, readOnly, changedWords, putBack],
  );

  return (
    <SettingsDeskContext value={shared}>
      <form noValidate onSubmit={(event) => void desk.ask(event)}>
        <UnsavedGuard unsaved={changed.length > 0} />
        <Groups />
        {shown ? <PreviewSection preview={shown} changed={changed} saved={base} /> : null}
        {begun && changed.length > 0 ? (
          <ClashNotice
            {...{ begun, saved: base, values, changed }}
            takesFocus={desk.stale}
            onTakeSaved={desk.putBack}
            onTakeAll={desk.putAllBack}
            onSettle={desk.settle}
          />
        ) : null}
        {error && changed.length > 0 && !begun ? (
          <Notice tone="error" title={patch.error ? "Not saved." : "Not counted."}>
            {errorWords(error)}. What you typed is still here.
          </Notice>
        ) : null}
        {changed.length > 0 ? (
          <SaveBar
            changes={changed.length}
            hint={hint}
            clash={begun !== null}
            previewed={shown !== null}
            asking={preview.isPending}
            saving={patch.isPending}
            onAsk={() => void desk.ask()}
            onSave={() => {
              if (!shown) return;
              desk.save(shown.patch, () => toast({ tone: "done", text: "Settings saved." }));
            }}
            onPutBack={desk.putAllBack}
          />
        ) : null}
      </form>
    </SettingsDeskContext>
  );
}
