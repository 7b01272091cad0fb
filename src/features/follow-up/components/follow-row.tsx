import { Link } from "react-router-dom";
import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { paths } from "../../../app/paths.ts";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { Answer } from "../../../components/ui/answer.tsx";
import { formatDay } from "../../../lib/formatters.ts";
import { gapWords } from "../../../lib/words.ts";
import { dayWords, followMark } from "../lib/due-days.ts";
import { CheckBar } from "./check-bar.tsx";
import { DueStrip, type DueStripProps } from "./due-strip.tsx";
import { followColumns } from "./follow-grid.ts";
import { FollowStatus, isFollowed } from "./follow-status.tsx";
import { ReopenFollowUp } from "./reopen-follow-up.tsx";

export type FollowRowProps = Omit<DueStripProps, "item"> & {
  item: FollowUpItem;
  investigationId: string;
};

/** A number that can be dialled: digits, with a plus in front. */
function dialled(phone: string): string | null {
  const digits = phone.replace(/[^\d+]/g, "");
  return /^\+?\d{4,}$/.test(digits) ? digits : null;
}

/** One contact: who, how to reach them, which day it is, and the strip of due days. */
export function FollowRow({ item, investigationId, ...strip }: FollowRowProps) {
  return (
    <li className={`border-b border-rule py-2 ${followColumns}`}>
      <p className="flex min-w-0 items-start gap-1.5">
        <PersonMark
          classification={item.classification ?? "contact"}
          wasContact={item.state === "became_case"}
          followUp={followMark(item)}
          className="mt-[0.125em] pointer-coarse:mt-2.5"
        />
        <span className="min-w-0 [overflow-wrap:anywhere]">
          <Link
            to={paths.person(investigationId, item.id)}
            className="me-2 text-kelp underline decoration-1 underline-offset-4
              pointer-coarse:inline-block pointer-coarse:py-2"
          >
            {item.name ?? item.studyNumber}
          </Link>
          {item.name ? (
            <span className="whitespace-nowrap text-sm text-ink-2">{item.studyNumber}</span>
          ) : null}
        </span>
      </p>
      <p className="min-w-0 text-end lg:text-start">
        <Phone item={item} />
      </p>
      <p className="text-sm text-ink-2 lg:text-[0.9375rem] lg:text-ink">
        <span className="lg:hidden">area: </span>
        <Answer value={item.area} />
      </p>
      <p className="text-end lg:text-start">
        {dayWords(item)}
        {item.lastDueDay === null || (item.dayNumber ?? 0) > item.monitoringDays ? null : (
          <span className="text-sm text-ink-2">
            {" "}
            · last due {formatDay(item.lastDueDay, { style: "short" })}
          </span>
        )}
      </p>
      <div className="col-span-2 min-w-0 lg:col-span-1">
        {item.dayZeroGap ? (
          <p className="text-sm text-ink-2">
            {gapWords[item.dayZeroGap]}.{" "}
            <Link
              to={paths.person(investigationId, item.id)}
              className="text-kelp underline decoration-1 underline-offset-4
                pointer-coarse:inline-block pointer-coarse:py-2"
            >
              Complete the exposure{" "}
              <span className="sr-only">of {item.name ?? item.studyNumber}</span>
            </Link>
          </p>
        ) : (
          <DueStrip item={item} {...strip} />
        )}
      </div>
      <div className="col-span-full flex min-w-0 flex-wrap items-center gap-x-5 gap-y-1.5">
        <FollowStatus item={item} />
        {isFollowed(item.state) ? (
          <CheckBar
            investigationId={investigationId}
            person={{ ...item, called: item.name ?? item.studyNumber }}
            today={strip.today}
          />
        ) : null}
        {item.end && item.state === item.end.reason ? (
          <ReopenFollowUp
            investigationId={investigationId}
            person={{ id: item.id, called: item.name ?? item.studyNumber }}
            end={item.end}
          />
        ) : null}
      </div>
    </li>
  );
}

/** A link that dials; absent where the number is not the reader's to know. */
function Phone({ item }: { item: FollowUpItem }) {
  if (item.phone === undefined) return <span className="text-sm text-ink-2">number not open</span>;
  if (item.phone === null || item.phone === "unknown" || item.phone === "refused") {
    return (
      <span className="text-sm text-ink-2">
        phone: <Answer value={item.phone} />
      </span>
    );
  }
  const number = dialled(item.phone);
  if (number === null) return <span>{item.phone}</span>;
  return (
    <a
      href={`tel:${number}`}
      className="inline-block py-0.5 text-kelp underline decoration-1 underline-offset-4
        pointer-coarse:min-h-11 pointer-coarse:py-2.5"
    >
      {item.phone}
    </a>
  );
}
