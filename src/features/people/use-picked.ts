import { useState } from "react";
import type { Person } from "../../../shared/contracts/people.ts";
import { ASSIGN_LIMITS } from "../../../shared/contracts/people-filters.ts";
import type { RowSelection } from "../../components/data-table/row-selection.ts";

/** Who is selected: some, with the versions that were seen, or everybody a question finds. */
type Picked =
  | { kind: "some"; question: string; people: ReadonlyMap<string, Person> }
  | { kind: "all"; question: string };

const nobody: ReadonlyMap<string, Person> = new Map();

/**
 * Selection of people in the line list. It ends with the question it was made in: nobody stays
 * selected out of sight.
 *
 * @param question names the question; another one begins with nobody selected
 */
export function usePicked(question: string, total: number) {
  const [picked, setPicked] = useState<Picked>({ kind: "some", question, people: nobody });
  const now: Picked =
    picked.question === question ? picked : { kind: "some", question, people: nobody };
  const people = now.kind === "some" ? now.people : nobody;
  const all = now.kind === "all";
  const keep = (next: Iterable<readonly [string, Person]>) =>
    setPicked({ kind: "some", question, people: new Map(next) });

  const selection: RowSelection<Person> = {
    label: (person) => `Select ${person.studyNumber}`,
    isSelected: (person) => all || people.has(person.id),
    toggle(person) {
      // Out of everybody, one box left empty means beginning anew with those in sight in mind.
      if (all) keep([]);
      else if (people.has(person.id)) keep([...people].filter(([id]) => id !== person.id));
      else keep([...people, [person.id, person]]);
    },
    add: (rows) => {
      if (!all) keep([...people, ...rows.map((person) => [person.id, person] as const)]);
    },
    selectAll: () => setPicked({ kind: "all", question }),
  };
  const count = all ? total : people.size;
  return {
    selection,
    all,
    people: [...people.values()],
    count,
    tooMany: count > (all ? ASSIGN_LIMITS.filter : ASSIGN_LIMITS.people),
    most: all ? ASSIGN_LIMITS.filter : ASSIGN_LIMITS.people,
    clear: () => keep([]),
  };
}
export type PickedPeople = ReturnType<typeof usePicked>;
