import { useState } from "react";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { type Fact, presentFacts } from "../person-facts.ts";
import type { PersonSection } from "../person-fields.ts";
import { EditPersonForm } from "./edit-person-form.tsx";
import { FactList } from "./fact-list.tsx";

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
            Change<span className="sr-only">: {title}</span>
          </Button>
        ) : null
      }
    >
      {editing ? (
        <EditPersonForm
          {...{ investigationId, person, section, today }}
          onDone={() => setEditing(false)}
        />
      ) : (
        <FactList facts={shown} person={person} />
      )}
    </Section>
  );
}
