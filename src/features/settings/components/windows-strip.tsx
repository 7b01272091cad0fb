import { useDeferredValue } from "react";
import { useWatch } from "react-hook-form";
import { DayStrip } from "../../../components/day-strip/day-strip.tsx";
import { formatDay } from "../../../lib/formatters.ts";
import { exampleRows } from "../form/example-rows.ts";
import { useSettings, useSettingsDesk } from "../form/settings-desk.ts";

/** The windows of one invented onset, drawn again as the numbers are typed. */
export function WindowsStrip() {
  const { saved } = useSettingsDesk();
  const { control } = useSettings();
  const [incubationMin, incubationMax, infectiousBefore, infectiousAfter, monitoringDays] =
    useWatch({
      control,
      name: [
        "incubationMin",
        "incubationMax",
        "infectiousBefore",
        "infectiousAfter",
        "monitoringDays",
      ],
    });
  // The boxes come first: the drawing may lag behind by a key or two.
  const numbers = useDeferredValue({
    incubationMin,
    incubationMax,
    infectiousBefore,
    infectiousAfter,
    monitoringDays,
  });
  const example = exampleRows(numbers, saved.today);
  if (!example) {
    return (
      <p className="pt-4 text-sm text-ink-2 italic">
        The example is drawn once all five numbers can be read.
      </p>
    );
  }
  return (
    <div className="pt-4">
      <DayStrip
        label="Example: windows around an onset"
        from={example.from}
        to={example.to}
        rows={example.rows}
        legend
        notes={
          <p className="text-sm text-ink-2">
            Example for an onset on {formatDay(saved.today)} and a contact last exposed that day:
            where the case may have been infected, when it may infect, and when the contact is due.
            Drawn with the numbers above as they stand.
          </p>
        }
      />
    </div>
  );
}
