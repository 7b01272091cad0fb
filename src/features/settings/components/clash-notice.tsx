import { useEffect, useRef } from "react";
import type { SettingKey, Settings } from "../../../../shared/contracts/settings.ts";
import { Button } from "../../../components/ui/button.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { SETTING_KEYS, type SettingsValues, toSettings } from "../form/setting-values.ts";
import { settingLabel } from "../setting-notes.ts";
import { ChangeValue } from "./change-value.tsx";

export type ClashNoticeProps = {
  /** As it was when the form began. */
  begun: Settings;
  saved: Settings;
  values: SettingsValues;
  changed: readonly SettingKey[];
  /** It answers an attempt to save, and did not come by itself. */
  takesFocus: boolean;
  onTakeSaved: (setting: SettingKey) => void;
  onTakeAll: () => void;
  onSettle: () => void;
};

/** Somebody saved first: what was typed stays, and the saved values stand beside it to be taken. */
export function ClashNotice(props: ClashNoticeProps) {
  const { begun, saved, values, changed, onTakeSaved, onTakeAll, onSettle } = props;
  const heading = useRef<HTMLHeadingElement>(null);
  const takesFocus = props.takesFocus;
  useEffect(() => {
    if (takesFocus) heading.current?.focus();
  }, [takesFocus]);
  const yours = toSettings(values);
  const theirs = SETTING_KEYS.filter(
    (key) => JSON.stringify(begun[key]) !== JSON.stringify(saved[key]),
  );
  const rows = SETTING_KEYS.filter((key) => theirs.includes(key) || changed.includes(key));
  return (
    <section
      id="clash"
      aria-labelledby="clash-title"
      className="scroll-mt-4 border-t border-coral pt-3 pb-4"
    >
      <div className="flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <h2
          id="clash-title"
          ref={heading}
          tabIndex={-1}
          className="me-auto scroll-mt-4 text-[1.0625rem] text-coral"
        >
          Someone else saved the settings first
        </h2>
        <Button size="small" onClick={onTakeAll}>
          Take all saved values
        </Button>
        <Button size="small" onClick={onSettle}>
          Go on with mine
        </Button>
      </div>
      <p className="mt-1">
        What you typed is still in its boxes. Settings you did not touch show what is saved now; see
        again what yours would move, then save.
      </p>
      <ScrollRegion label="Saved values and yours" className="mt-3">
        <Table caption="Settings that either of you changed">
          <thead>
            <tr>
              <HeadCell>setting</HeadCell>
              <HeadCell>when you began</HeadCell>
              <HeadCell>saved now</HeadCell>
              <HeadCell>yours</HeadCell>
              <HeadCell>
                <span className="sr-only">take the saved one</span>
              </HeadCell>
            </tr>
          </thead>
          <tbody>
            {rows.map((key) => (
              <tr key={key}>
                <HeadCell scope="row">{settingLabel(key)}</HeadCell>
                <Cell>
                  <ChangeValue setting={key} value={begun[key]} />
                </Cell>
                <Cell className={theirs.includes(key) ? "font-bold" : undefined}>
                  <ChangeValue setting={key} value={saved[key]} />
                </Cell>
                <Cell className={changed.includes(key) ? "font-bold" : undefined}>
                  {changed.includes(key) ? (
                    <ChangeValue setting={key} value={yours[key]} />
                  ) : (
                    <span className="text-ink-2">as saved</span>
                  )}
                </Cell>
                <Cell className="text-end">
                  {changed.includes(key) ? (
                    <Button size="small" onClick={() => onTakeSaved(key)}>
                      Take saved <span className="sr-only">{settingLabel(key)}</span>
                    </Button>
                  ) : null}
                </Cell>
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
    </section>
  );
}
