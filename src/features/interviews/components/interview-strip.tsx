import { useDeferredValue } from "react";
import { useWatch } from "react-hook-form";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { DayStrip } from "../../../components/day-strip/day-strip.tsx";
import type { InterviewValues } from "../form/interview-values.ts";
import { exposureRows, stripScale, windowRows } from "../form/strip-rows.ts";
import { useFormSurroundings } from "./form-context.ts";
import { useInterviewForm } from "./use-exposure-boxes.ts";

function Strip({
  person,
  today,
  typed,
}: {
  person: PersonPage;
  today: string;
  typed: Pick<InterviewValues, "contacts" | "groupExposures">;
}) {
  const windows = windowRows(person);
  const exposures = exposureRows(typed);
  const scale = stripScale(person, exposures, today);
  return (
    <DayStrip
      label={`Windows and contacts of ${person.studyNumber}`}
      {...scale}
      today={today}
      rows={[...windows, ...exposures]}
      legend
    />
  );
}

/** The windows with the contacts typed so far, drawn again as they are typed. */
export function InterviewStrip() {
  const { person, today } = useFormSurroundings();
  const { control } = useInterviewForm();
  const [contacts, groupExposures] = useWatch({ control, name: ["contacts", "groupExposures"] });
  // The boxes come first: the drawing may lag behind by a key or two.
  const typed = useDeferredValue({ contacts, groupExposures });
  return <Strip person={person} today={today} typed={typed} />;
}
