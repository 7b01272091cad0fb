import { useParams } from "react-router-dom";
import { FollowSection } from "../../features/follow-up/components/follow-section.tsx";
import { PersonRecord } from "../../features/people/components/person-record.tsx";
import { TestSection } from "../../features/tests/components/test-section.tsx";
import { useInvestigation } from "../../lib/investigation-context.ts";

/** A person's page with their follow-up and tests. */
export function Component() {
  const { personId = "" } = useParams();
  const { id: investigationId, today, timeZone } = useInvestigation();
  return (
    <PersonRecord
      // Another person is another page: nothing typed for the one before stays in a box.
      key={personId}
      personId={personId}
      followUp={(person) =>
        person.can.edit ? (
          <FollowSection
            investigationId={investigationId}
            person={person}
            timeZone={timeZone}
            today={today}
          />
        ) : null
      }
      tests={(person) => (
        <TestSection
          investigationId={investigationId}
          personId={person.id}
          today={today}
          canAdd={person.can.addTest === true}
        />
      )}
    />
  );
}
