import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { DayAxis, dayAxisHeight } from "../../../components/day-strip/day-axis.tsx";
import { createDayScale } from "../../../components/day-strip/day-scale.ts";
import { DueShape } from "../../../components/day-strip/due-marks.tsx";
import { dueDays, stripWords } from "../lib/due-days.ts";

const height = 24;

export type DueStripProps = {
  item: FollowUpItem;
  from: string;
  to: string;
  today: string;
  width: number;
};

/** The due days of one contact on the page's common scale; drawn small, said in words. */
export function DueStrip({ item, from, to, today, width }: DueStripProps) {
  const scale = createDayScale(from, to, 1, width - 1);
  const now = scale.middle(today);
  return (
    <svg
      width={width}
      height={height}
      role="img"
      aria-label={stripWords(item, today)}
      className="figure-svg max-w-full"
    >
      {now === null ? null : (
        <path d={`M${now} 0V${height}`} stroke="var(--coral)" strokeWidth={0.75} fill="none" />
      )}
      <DueShape
        row={{ id: item.id, label: "", type: "due", days: dueDays(item, today) }}
        scale={scale}
        y={0}
        height={height}
      />
    </svg>
  );
}

/** The axis over the strips of the page. */
export function DueAxis(props: Omit<DueStripProps, "item">) {
  const scale = createDayScale(props.from, props.to, 1, props.width - 1);
  return (
    <svg
      width={props.width}
      height={dayAxisHeight}
      aria-hidden="true"
      className="figure-svg max-w-full"
    >
      <DayAxis scale={scale} today={props.today} bottom={dayAxisHeight} todayLabel="today" />
    </svg>
  );
}
