import { fieldWords } from "../../../lib/form-errors.ts";
import type { KnownPerson } from "../form/interview-values.ts";
import { placeAttributes } from "./row-box.tsx";

export type TiedPersonProps = {
  row: number;
  known: KnownPerson;
  error: string | undefined;
  onUntie: () => void;
};

/** Instead of name and phone: the person on record that the row is, and the way back. */
export function TiedPerson({ row, known, error, onUntie }: TiedPersonProps) {
  return (
    <div className="col-span-2 min-w-0 lg:col-span-6 min-[85rem]:col-span-2">
      <div className="flex min-h-9 items-baseline gap-2 border-s-2 border-kelp ps-2">
        <span className="min-w-0 flex-1 [overflow-wrap:anywhere]">
          <strong>{known.studyNumber}</strong> {known.name ?? ""}
          <span className="block text-sm leading-4 text-ink-2">
            {["on record", known.ageBand, known.area].filter(Boolean).join(" · ")}
          </span>
        </span>
        <button
          type="button"
          {...placeAttributes({ list: "contacts", row, box: "name" })}
          aria-label={`Untie row ${row + 1} from ${known.studyNumber}`}
          className="min-h-7 shrink-0 text-sm text-kelp underline underline-offset-4
            pointer-coarse:min-h-11"
          onClick={onUntie}
        >
          untie
        </button>
      </div>
      {error ? <p className="mt-0.5 text-sm text-coral">{fieldWords(error)}</p> : null}
    </div>
  );
}
