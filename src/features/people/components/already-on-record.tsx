import { useQuery } from "@tanstack/react-query";
import { type Control, useWatch } from "react-hook-form";
import { Link } from "react-router-dom";
import type { Match, PersonInput } from "../../../../shared/contracts/people.ts";
import { paths } from "../../../app/paths.ts";
import { useSettled } from "../../../lib/use-settled.ts";
import { classificationWords, wordFor } from "../../../lib/words.ts";
import { matchesQuery } from "../api/match-people.ts";
import type { PersonValues } from "../person-fields.ts";

export type AlreadyOnRecordProps = {
  investigationId: string;
  control: Control<PersonValues, unknown, PersonInput>;
};

const matchWords = { phone: "telephone", name: "name", sound: "sound of the name" };

/** While a person is being registered: who in sight looks the same, so that none is entered twice. */
export function AlreadyOnRecord({ investigationId, control }: AlreadyOnRecordProps) {
  const [name, phone] = useWatch({ control, name: ["name", "phone"] });
  const settledName = useSettled(name, 400);
  const settledPhone = useSettled(phone, 400);
  const matches = useQuery(
    matchesQuery(investigationId, { name: settledName, phone: settledPhone }),
  );
  const found = name.trim() === "" && phone.trim() === "" ? [] : (matches.data?.items ?? []);
  return (
    <div aria-live="polite" className="sm:col-span-2">
      {found.length === 0 ? null : (
        <div className="border-y border-ochre bg-paper-2 px-3 py-2">
          <p className="font-bold text-ochre">Already on record?</p>
          <ul>
            {found.map((match) => (
              <li key={match.personId} className="py-1">
                <Link to={paths.person(investigationId, match.personId)}>
                  {match.name ?? match.studyNumber}
                </Link>
                <span className="ms-2 text-sm text-ink-2">{detail(match)}</span>
              </li>
            ))}
          </ul>
        </div>
      )}
    </div>
  );
}

function detail(match: Match): string {
  return [
    match.studyNumber,
    match.classification ? wordFor(classificationWords, match.classification) : null,
    match.ageBand,
    match.area,
    `same ${match.matchedOn.map((what) => wordFor(matchWords, what)).join(", ")}`,
  ]
    .filter(Boolean)
    .join(" · ");
}
