import { useId } from "react";
import type { Assignees } from "../../../../shared/contracts/people-filters.ts";
import { CLASSIFICATIONS } from "../../../../shared/vocabulary.ts";
import { Button } from "../../../components/ui/button.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import { classificationWords } from "../../../lib/words.ts";
import type { ListState } from "../use-list-state.ts";
import { MoreFilters } from "./more-filters.tsx";

const classifications = [
  { value: "", label: "all" },
  { value: "case", label: "cases of any certainty" },
  ...CLASSIFICATIONS.map((value) => ({ value, label: classificationWords[value] })),
];
const interviewed = [
  { value: "", label: "all" },
  { value: "yes", label: "yes" },
  { value: "no", label: "no" },
];
const assigned = [
  { value: "", label: "all" },
  { value: "me", label: "me" },
  { value: "team", label: "my team" },
  { value: "none", label: "nobody" },
];

export type LineListFiltersProps = {
  state: ListState;
  /** Keys of the answers: what cannot be read cannot be filtered by. */
  keys: ReadonlySet<string>;
  areas: readonly string[];
  /** Members by name, where the reader may know them. */
  members: Assignees["members"];
};

/** Search and filters above the line list. */
export function LineListFilters({ state, keys, areas, members }: LineListFiltersProps) {
  const id = useId();
  const holders = [
    ...assigned,
    ...members.map(({ accountId, displayName }) => ({ value: accountId, label: displayName })),
  ];
  const holder = state.filters.assigned ?? "";
  if (!holders.some(({ value }) => value === holder)) {
    holders.push({ value: holder, label: "a member" });
  }
  return (
    <>
      <label htmlFor={`${id}-q`} className="text-sm">
        <span className="mb-1 block text-ink-2">{searchWords(keys)}</span>
        <input
          id={`${id}-q`}
          type="search"
          autoComplete="off"
          spellCheck={false}
          className="field-box w-72 max-w-full"
          value={state.typed.q}
          onChange={(event) => state.setTyped({ ...state.typed, q: event.target.value })}
        />
      </label>
      <Labelled words="classification">
        <MenuSelect
          label="Classification"
          hideLabel
          options={classifications}
          value={state.filters.classification ?? ""}
          onValueChange={(value) => state.setFilter("classification", value)}
        />
      </Labelled>
      <Labelled words="interviewed">
        <MenuSelect
          label="Interviewed"
          hideLabel
          options={interviewed}
          value={state.filters.interviewed ?? ""}
          onValueChange={(value) => state.setFilter("interviewed", value)}
        />
      </Labelled>
      {keys.has("assignedTo") || holder ? (
        <Labelled words="assigned to">
          <MenuSelect
            label="Assigned to"
            hideLabel
            options={holders}
            value={holder}
            onValueChange={(value) => state.setFilter("assigned", value)}
          />
        </Labelled>
      ) : null}
      <label htmlFor={`${id}-area`} className="text-sm">
        <span className="mb-1 block text-ink-2">area, as written</span>
        <input
          id={`${id}-area`}
          list={`${id}-areas`}
          autoComplete="off"
          className="field-box w-36 max-w-full"
          value={state.typed.area}
          onChange={(event) => state.setTyped({ ...state.typed, area: event.target.value })}
        />
        <datalist id={`${id}-areas`}>
          {areas.map((area) => (
            <option key={area} value={area} />
          ))}
        </datalist>
      </label>
      <MoreFilters state={state} />
      {state.anyFilter ? <Button onClick={state.clear}>Show all</Button> : null}
    </>
  );
}

function Labelled({ words, children }: { words: string; children: React.ReactNode }) {
  return (
    <div className="text-sm">
      <span className="mb-1 block text-ink-2" aria-hidden="true">
        {words}
      </span>
      {children}
    </div>
  );
}

/** What this reader's search looks through, by what the answers hold. */
function searchWords(keys: ReadonlySet<string>): string {
  if (keys.size === 0) return "Find";
  if (keys.has("name")) return "Find by name, telephone, reference or study number";
  return keys.has("ref") ? "Find by reference or study number" : "Find by study number";
}
