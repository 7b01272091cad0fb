import type { FollowUpItem } from "../../../../shared/contracts/follow-up.ts";
import { FOLLOW_ENDS, type FollowState } from "../../../../shared/vocabulary.ts";
import { Tag, type TagTone } from "../../../components/ui/tag.tsx";
import { formatDay } from "../../../lib/formatters.ts";
import { checkWords, followStateWords } from "../../../lib/words.ts";

const tones: Readonly<Record<FollowState, TagTone>> = {
  to_be_notified: "ochre",
  under_follow_up: "quiet",
  completed: "kelp",
  lost: "coral",
  became_case: "plain",
  refused: "ochre",
  moved: "quiet",
  died: "plain",
  not_a_contact: "quiet",
};

const OVER: readonly FollowState[] = ["became_case", ...FOLLOW_ENDS];

/** Contacts of whom checks are still made; also after the last day, when it is to be caught up. */
export function isFollowed(state: FollowState): boolean {
  return !OVER.includes(state);
}

export function StateTag({ state }: { state: FollowState }) {
  return <Tag tone={tones[state]}>{followStateWords[state]}</Tag>;
}

/** "household-12" as it is said: whom somebody stands together with, without a name. */
function togetherWords(together: string): string {
  return together.startsWith("household-")
    ? `with household ${together.slice("household-".length)}`
    : "shares a telephone";
}

/** State of a contact, symptoms first, and the last check in words. */
export function FollowStatus({ item }: { item: FollowUpItem }) {
  const { lastCheck, end, reopenedOn } = item;
  return (
    <p className="flex flex-wrap items-baseline gap-x-2 gap-y-1 text-sm text-ink-2 xl:w-[33rem]">
      {item.symptomatic ? (
        <Tag tone="coral" className="font-bold">
          symptoms reported
        </Tag>
      ) : null}
      <StateTag state={item.state} />
      {end && item.state === end.reason ? (
        <span>on {formatDay(end.day, { style: "short" })}</span>
      ) : null}
      {reopenedOn && !end ? (
        <Tag tone="quiet">reopened {formatDay(reopenedOn, { style: "short" })}</Tag>
      ) : null}
      {item.together ? <Tag tone="blue">{togetherWords(item.together)}</Tag> : null}
      <span>
        {lastCheck
          ? `last check ${formatDay(lastCheck.day, { style: "short" })}: ${checkWords[lastCheck.outcome]}`
          : "no check yet"}
      </span>
    </p>
  );
}
