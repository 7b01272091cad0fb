import { useEffect, useRef } from "react";
import type { SettingKey, Settings } from "../../../../shared/contracts/settings.ts";
import { Notice } from "../../../components/ui/notice.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatNumber } from "../../../lib/formatters.ts";
import type { ShownPreview } from "../form/use-settings-form.ts";
import { differenceWords, measureWords } from "../measure-words.ts";
import { settingLabel } from "../setting-notes.ts";
import { joined } from "../setting-words.ts";

export type PreviewSectionProps = {
  preview: ShownPreview;
  changed: readonly SettingKey[];
  saved: Settings;
};

/** What the change would move, counted on what is on record; takes the focus when it arrives. */
export function PreviewSection({ preview, changed, saved }: PreviewSectionProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  // biome-ignore lint/correctness/useExhaustiveDependencies: each preview that arrives is a new one.
  useEffect(() => heading.current?.focus(), [preview]);
  const { moves, newCaseDefinition } = preview.result;
  const still = changed.filter((one) => moves.every(({ setting }) => setting !== one));
  return (
    <section aria-labelledby="would-move" className="border-t border-ink pt-3 pb-4">
      <h2 id="would-move" ref={heading} tabIndex={-1} className="scroll-mt-4 text-[1.0625rem]">
        What would move
      </h2>
      <p className="mt-1 mb-2 text-sm text-ink-2">
        Counted on what is on record now, with the saved settings and with yours. Asking has stored
        nothing.
      </p>
      {newCaseDefinition ? (
        <Notice tone="warn" title="A new version of the case definition." className="mb-3">
          Saving makes version {formatNumber(saved.caseDefinitionVersion + 1)}. Classifications keep
          the version they were made with; nobody is classed anew.
        </Notice>
      ) : null}
      {moves.length > 0 ? (
        <ScrollRegion label="What would move, table" className="max-w-5xl">
          <Table caption="What the change would move" hideCaption>
            <thead>
              <tr>
                <HeadCell>setting</HeadCell>
                <HeadCell className="max-sm:px-1">what</HeadCell>
                <HeadCell numeric className="max-sm:px-1">
                  before
                </HeadCell>
                <HeadCell numeric className="max-sm:px-1">
                  after
                </HeadCell>
                <HeadCell className="max-sm:ps-1">difference</HeadCell>
              </tr>
            </thead>
            <tbody>
              {moves.map(({ setting, measure, before, after }) => (
                <tr key={`${setting} ${measure}`}>
                  <HeadCell scope="row" className="max-sm:pe-1 max-sm:text-sm">
                    {settingLabel(setting)}
                  </HeadCell>
                  <Cell className="min-w-24 max-sm:px-1 max-sm:text-sm">
                    {measureWords[measure]}
                  </Cell>
                  <Cell numeric className="max-sm:px-1 max-sm:text-sm">
                    {formatNumber(before)}
                  </Cell>
                  <Cell numeric className="max-sm:px-1 max-sm:text-sm">
                    {formatNumber(after)}
                  </Cell>
                  <Cell
                    className={`sm:whitespace-nowrap max-sm:ps-1 max-sm:text-sm ${before === after ? "text-ink-2" : "font-bold"}`}
                  >
                    {differenceWords(before, after)}
                  </Cell>
                </tr>
              ))}
            </tbody>
          </Table>
        </ScrollRegion>
      ) : null}
      {still.length > 0 ? (
        <p className="mt-2 text-sm">
          Nothing that is counted moves with {joined(still.map(settingLabel))}.
        </p>
      ) : null}
    </section>
  );
}
