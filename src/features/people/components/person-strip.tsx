import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { DayStrip } from "../../../components/day-strip/day-strip.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import { personStrip } from "../strip-rows.ts";

export type PersonStripProps = { person: PersonPage; today: string };

/** Windows, due days and contacts of a person on one scale of days. */
export function PersonStrip({ person, today }: PersonStripProps) {
  const strip = personStrip(person, today);
  if (!strip) return null;
  return (
    <Section title="Days" subLine="windows, contacts laid on the days of exposure, due days">
      <DayStrip
        label={`Days of ${person.studyNumber}`}
        from={strip.from}
        to={strip.to}
        today={today}
        rows={strip.rows}
        legend
        notes={
          strip.leftOut > 0 ? (
            <p className="text-sm text-ink-2">
              {formatCount(strip.leftOut, "further pair", "further pairs")} in the table below.
            </p>
          ) : null
        }
      />
    </Section>
  );
}
