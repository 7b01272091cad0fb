import { type KeyboardEvent, useEffect, useRef } from "react";
import type { Match } from "../../../../shared/contracts/people.ts";

const reasons: Record<Match["matchedOn"][number], string> = {
  phone: "same phone",
  name: "name",
  sound: "name sounds alike",
};

export type MatchListProps = {
  matches: readonly Match[];
  /** Which row somebody stands in already, by person id; choosing again adds an exposure. */
  taken: ReadonlyMap<string, string>;
  onChoose: (match: Match) => void;
  /** Back to the box, by Escape or by going up from the first one. */
  onLeave: () => void;
};

/** People already on record, offered under the row that is being typed. */
export function MatchList({ matches, taken, onChoose, onLeave }: MatchListProps) {
  const box = useRef<HTMLDivElement>(null);
  const list = useRef<HTMLUListElement>(null);

  // The foot of the page must not cover what is being offered.
  useEffect(() => {
    if (matches.length > 0) box.current?.scrollIntoView?.({ block: "nearest" });
  }, [matches.length]);

  function onKeyDown(event: KeyboardEvent) {
    const items = [...(list.current?.querySelectorAll("button") ?? [])];
    const at = items.indexOf(document.activeElement as HTMLButtonElement);
    if (event.key === "Escape" || (event.key === "ArrowUp" && at <= 0)) {
      event.preventDefault();
      onLeave();
    } else if (!event.altKey && (event.key === "ArrowDown" || event.key === "ArrowUp")) {
      event.preventDefault();
      items[at + (event.key === "ArrowDown" ? 1 : -1)]?.focus();
    }
  }

  return (
    <div ref={box} className="scroll-mb-24 border-s-2 border-kelp ps-2">
      <p className="text-sm text-ink-2" role="status">
        {matches.length === 1 ? "1 person" : `${matches.length} people`} already on record may be
        meant; choosing ties the row to that person.
        <span className="hidden lg:inline"> Down, then Enter.</span>
      </p>
      <ul ref={list} onKeyDown={onKeyDown} data-matches="" className="max-w-3xl">
        {matches.map((match) => {
          const reason = taken.get(match.personId);
          return (
            <li key={match.personId} className="border-b border-rule last:border-b-0">
              <button
                type="button"
                tabIndex={-1}
                onClick={() => onChoose(match)}
                className="flex min-h-8 w-full flex-wrap items-baseline gap-x-3 px-1 text-start
                  hover:bg-paper-2 focus-visible:bg-wash focus-visible:outline-offset-[-2px]  pointer-coarse:min-h-11 pointer-coarse:py-1"
              >
                <span className="font-bold">{match.studyNumber}</span>
                <span>{match.name ?? "name not on record"}</span>
                <span className="text-sm text-ink-2">
                  {[
                    match.ageBand ? `aged ${match.ageBand}` : "age not on record",
                    match.area,
                    match.phoneLast2 ? `phone ends ${match.phoneLast2}` : null,
                  ]
                    .filter(Boolean)
                    .join(" · ")}
                </span>
                <span className="text-sm text-kelp">
                  {[
                    ...match.matchedOn.map((one) => reasons[one]),
                    ...(reason ? [reason] : []),
                  ].join(", ")}
                </span>
              </button>
            </li>
          );
        })}
      </ul>
    </div>
  );
}
