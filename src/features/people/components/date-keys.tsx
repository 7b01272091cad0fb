const keys = [
  ["2026-05-18", "a day, also as 20260518"],
  ["2026-05", "a month, when the day is not known"],
  ["t", "today"],
  ["y", "yesterday"],
  ["-3", "three days ago"],
  ["u", "asked, not known"],
  ["r", "asked, not told"],
] as const;

/** What can be typed where a date is asked. */
export function DateKeys() {
  return (
    <dl className="text-sm">
      {keys.map(([typed, words]) => (
        <div key={typed} className="grid grid-cols-[6rem_minmax(0,1fr)] gap-x-2 py-0.5">
          <dt className="text-ink">{typed}</dt>
          <dd className="text-ink-2">{words}</dd>
        </div>
      ))}
    </dl>
  );
}
