import { useQueryClient } from "@tanstack/react-query";
import { useCallback, useEffect, useState } from "react";
import { useForm } from "react-hook-form";
import type {
  SettingKey,
  Settings,
  SettingsPatch,
  SettingsPreview,
} from "../../../../shared/contracts/settings.ts";
import { ApiError } from "../../../lib/api-error.ts";
import { contractResolver, showFieldErrors } from "../../../lib/form-errors.ts";
import { settingsQuery } from "../api/get-settings.ts";
import { usePatchSettings } from "../api/patch-settings.ts";
import { usePreviewSettings } from "../api/preview-settings.ts";
import {
  changedSettings,
  changeOf,
  changeSchema,
  type SettingsValues,
  valuesOf,
} from "./setting-values.ts";

/** What was asked about, word for word, and what it would move. */
export type ShownPreview = { key: string; patch: SettingsPatch; result: SettingsPreview };

/** The saved values with the boxes of some settings left as they were typed. */
function keeping(saved: Settings, typed: SettingsValues, keys: readonly SettingKey[]) {
  const kept = keys.map((key) => [key, typed[key]] as const);
  return { ...valuesOf(saved), ...Object.fromEntries(kept) } as SettingsValues;
}

/**
 * One form over all settings. What differs from the saved ones is asked about first; only a change
 * of which the preview was shown can be saved, and word for word that one. When somebody else saves
 * in between, what was typed stays and `begun` keeps what the form had begun with.
 */
export function useSettingsForm(investigationId: string, saved: Settings) {
  const queryClient = useQueryClient();
  const [base, setBase] = useState(saved);
  const [begun, setBegun] = useState<Settings | null>(null);
  const [shown, setShown] = useState<ShownPreview | null>(null);
  const preview = usePreviewSettings(investigationId);
  const patch = usePatchSettings(investigationId);
  const form = useForm<SettingsValues, unknown, SettingsPatch>({
    resolver: contractResolver<SettingsValues, SettingsPatch>(changeSchema(base)),
    defaultValues: valuesOf(base),
  });
  const values = form.watch();
  const changed = changedSettings(values, base);
  const key = JSON.stringify(changeOf(values, base));
  const stale = [preview.error, patch.error].some(
    (error) => error instanceof ApiError && error.code === "stale_version",
  );

  useEffect(() => {
    // An answer that was on its way while a newer version was saved says nothing new.
    if (saved.version <= base.version) return;
    const typed = form.getValues();
    const mine = changedSettings(typed, base);
    form.reset(keeping(saved, typed, mine));
    setBase(saved);
    if (mine.length > 0) setBegun((first) => first ?? base);
  }, [saved, base, form]);

  const putBack = useCallback(
    (setting: SettingKey) => {
      const typed = form.getValues();
      const others = changedSettings(typed, base).filter((one) => one !== setting);
      form.reset(keeping(base, typed, others));
    },
    [form, base],
  );

  function refused(error: unknown) {
    showFieldErrors(error, form.setError, (path) => (path.split(".")[0] ?? "") in values);
    if (error instanceof ApiError && error.code === "stale_version") {
      void queryClient.invalidateQueries(settingsQuery(investigationId));
    }
  }

  return {
    form,
    base,
    values,
    changed,
    begun,
    stale,
    preview,
    patch,
    /** The preview of exactly what the boxes say now; null while none was shown. */
    shown: shown?.key === key ? shown : null,
    /** A preview was shown, and something was typed since. */
    outdated: shown !== null && shown.key !== key && changed.length > 0,
    ask: form.handleSubmit((body) => {
      patch.reset();
      preview.mutate(body, {
        onSuccess: (result) => setShown({ key, patch: body, result }),
        onError: refused,
      });
    }),
    save(body: SettingsPatch, done: () => void) {
      patch.mutate(body, {
        onSuccess(now) {
          form.reset(valuesOf(now));
          setBase(now);
          setBegun(null);
          setShown(null);
          queryClient.setQueryData(settingsQuery(investigationId).queryKey, now);
          done();
        },
        onError: refused,
      });
    },
    /** Drops what was typed for one setting. */
    putBack,
    /** Drops all that was typed. */
    putAllBack() {
      form.reset(valuesOf(base));
      setBegun(null);
      preview.reset();
      patch.reset();
    },
    /** The reader has seen what somebody else saved. */
    settle() {
      setBegun(null);
      preview.reset();
      patch.reset();
    },
  };
}
