import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import type { Drawn, QuestionChange } from "../use-question.ts";
import { populationOptions } from "./question-controls.tsx";

const exposureOptions: readonly { value: Drawn["exposures"]; label: string }[] = [
  { value: "all", label: "all on record" },
  { value: "question", label: "as chosen above" },
];

export type PictureToolsProps = {
  drawn: Drawn;
  onChange: (change: QuestionChange) => void;
};

/** Whom and which exposures the picture draws; apart from the figures, which are about a window. */
export function PictureTools({ drawn, onChange }: PictureToolsProps) {
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2" data-print="hide">
      <MenuSelect
        label="people drawn"
        size="small"
        options={populationOptions}
        value={drawn.population}
        onValueChange={(value) => onChange({ drawn: value })}
      />
      <MenuSelect
        label="exposures drawn"
        size="small"
        options={exposureOptions}
        value={drawn.exposures}
        onValueChange={(value) => onChange({ drawnExposures: value })}
      />
      <label className="inline-flex min-h-7 items-center gap-2 text-sm">
        <input
          type="checkbox"
          checked={drawn.unpaired}
          onChange={(event) => onChange({ unpaired: event.target.checked ? "yes" : undefined })}
        />
        also people without a contact pair
      </label>
    </div>
  );
}
