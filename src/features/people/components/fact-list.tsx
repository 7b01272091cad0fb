import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { Answer } from "../../../components/ui/answer.tsx";
import { formatDay } from "../../../lib/formatters.ts";
import { classificationWords, wordFor } from "../../../lib/words.ts";
import type { Fact } from "../person-facts.ts";

export type FactListProps = { facts: readonly Fact[]; person: PersonPage };

/** Labels and values of a record, only those that the answer holds. */
export function FactList({ facts, person }: FactListProps) {
  return (
    <dl className="grid gap-x-8 border-t border-rule sm:grid-cols-2">
      {facts.map((fact) => (
        <div
          key={fact.key}
          className={`grid grid-cols-[9.5rem_minmax(0,1fr)] gap-x-3 border-b border-rule py-1.5 ${
            fact.kind === "note" ? "sm:col-span-2" : ""
          }`}
        >
          <dt className="text-sm leading-6 text-ink-2">{fact.label}</dt>
          <dd className="min-w-0 break-words leading-6">
            <FactValue fact={fact} person={person} />
          </dd>
        </div>
      ))}
    </dl>
  );
}

function FactValue({ fact, person }: { fact: Fact; person: PersonPage }) {
  const value = person[fact.key] as string | number | null | undefined;
  switch (fact.kind) {
    case "day":
      return <Answer value={value} format={(day) => formatDay(String(day), { style: "long" })} />;
    case "classification":
      return <Answer value={value} format={(code) => wordFor(classificationWords, String(code))} />;
    case "phone":
      return (
        <Answer
          value={value}
          format={(number) => <a href={`tel:${String(number).replace(/[^\d+]/g, "")}`}>{number}</a>}
        />
      );
    case "note":
      return (
        <Answer
          value={value}
          format={(text) => <span className="whitespace-pre-line">{text}</span>}
        />
      );
    case "text":
      return <Answer value={value} />;
  }
}
