import { lazy, Suspense, useState } from "react";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { type Fact, presentFacts } from "../person-facts.ts";
import type { PersonSection } from "../person-fields.ts";
import { FactList } from "./fact-list.tsx";

// Most pages are read only; the form comes when it is asked for.
const EditPersonForm = lazy(() =>
  import("./edit-person-form.tsx").then((file) => ({ default: file.EditPersonForm })),
);

export type EditableSectionProps = {
  title: string;
  subLine?: string;
  section: PersonSection;
  facts: readonly Fact[];
  person: PersonPage;
  investigationId: string;
  today: string;
};

/** A part of a record: read as facts, changed in place where the record says `can.edit`. */
export function EditableSection(props: EditableSectionProps) {
  const { title, subLine, section, facts, person, investigationId, today } = props;
  const [editing, setEditing] = useState(false);
  const shown = presentFacts(facts, person);
  if (shown.length === 0) return null;
  return (
    <Section
      title={title}
      subLine={subLine}
      actions={
        person.can.edit && !editing ? (
          <Button size="small" onClick={() => setEditing(true)}>
            Change <span className="sr-only">{title}</span>
          </Button>
        ) : null
      }
    >
      {editing ? (
        <Suspense fallback={<LoadingState label="Opening the form" />}>
          <EditPersonForm
            {...{ investigationId, person, section, today }}
            onDone={() => setEditing(false)}
          />
        </Suspense>
      ) : (
        <FactList facts={shown} person={person} />
      )}
    </Section>
  );
}
