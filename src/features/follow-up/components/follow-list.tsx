import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { DayStripLegend } from "../../../components/day-strip/day-strip-legend.tsx";
import { useWidth } from "../../../lib/use-width.ts";
import { commonScale, dueDays } from "../lib/due-days.ts";
import { DueAxis } from "./due-strip.tsx";
import { followColumns } from "./follow-grid.ts";
import { FollowRow } from "./follow-row.tsx";

export type FollowListProps = {
  items: readonly FollowUpItem[];
  today: string;
  investigationId: string;
  /** Rows of the page before are shown while new ones come. */
  updating: boolean;
};

/** The contacts of one page under one axis of days. */
export function FollowList({ items, today, investigationId, updating }: FollowListProps) {
  const [ref, width] = useWidth(320);
  const scale = { ...commonScale(items, today), today, width };
  return (
    <div aria-busy={updating || undefined} className={updating ? "opacity-60" : undefined}>
      <div className={`border-t border-ink pt-1 text-sm text-ink-2 ${followColumns} items-end`}>
        {["contact", "phone", "area", "day"].map((head) => (
          <span key={head} aria-hidden="true" className="hidden pb-1 lg:block">
            {head}
          </span>
        ))}
        <div ref={ref} className="col-span-2 min-w-0 lg:col-span-1">
          <DueAxis {...scale} />
        </div>
      </div>
      <ul aria-label="Contacts under follow-up">
        {items.map((item) => (
          <FollowRow key={item.id} item={item} investigationId={investigationId} {...scale} />
        ))}
      </ul>
      <div className="mt-2">
        <DayStripLegend
          rows={[
            {
              id: "all",
              label: "",
              type: "due",
              days: items.flatMap((item) => dueDays(item, today)),
            },
          ]}
        />
      </div>
    </div>
  );
}
