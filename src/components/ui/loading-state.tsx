export type LoadingStateProps = {
  /** What is being fetched: "Loading the line list". */
  label: string;
  /** Blank rows to hold the place of what comes; none by default. */
  rows?: number;
};

const widths = ["w-11/12", "w-4/5", "w-10/12", "w-3/5", "w-9/12"];

/** Waiting, said in words, with hairlines where the rows will be so that the page does not jump. */
export function LoadingState({ label, rows = 0 }: LoadingStateProps) {
  const lines = Array.from({ length: rows }, (_, index) => index);
  return (
    <div role="status" aria-live="polite">
      <p className="py-2 text-ink-2">{label} …</p>
      <div aria-hidden="true">
        {lines.map((line) => (
          <div key={line} className="border-t border-rule py-3">
            <div
              className={`h-3 motion-safe:animate-pulse bg-paper-2 ${widths[line % widths.length] ?? ""}`}
            />
          </div>
        ))}
      </div>
    </div>
  );
}
