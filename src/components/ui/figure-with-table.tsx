import { type KeyboardEvent, type ReactNode, useId, useState } from "react";
import { ScrollRegion } from "./scroll-region.tsx";

export type FigureWithTableProps = {
  /** Names the figure for readers. */
  label: string;
  /** The drawing. */
  children: ReactNode;
  /** The same figures as a table. */
  table: ReactNode;
  /** Sentence, caution, legend: stays under both forms. */
  notes?: ReactNode;
  /** No visible button, for rows of small figures; the key still works. */
  quiet?: boolean;
  /** Keeps the drawing in the page, unseen, while the table is shown, so that it can be taken out. */
  keepDrawing?: boolean;
};

/** A drawing whose table is one key away: `t` inside the figure, or the button at its foot. */
export function FigureWithTable({
  label,
  children,
  table,
  notes,
  quiet = false,
  keepDrawing = false,
}: FigureWithTableProps) {
  const [asTable, setAsTable] = useState(false);
  const id = useId();

  function onKeyDown(event: KeyboardEvent) {
    if (event.key.toLowerCase() !== "t" || event.altKey || event.ctrlKey || event.metaKey) return;
    if (/^(input|textarea|select)$/i.test((event.target as Element).tagName)) return;
    event.preventDefault();
    setAsTable((current) => !current);
  }

  return (
    <figure
      aria-label={label}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: the figure takes focus so that its table is one key away.
      tabIndex={0}
      aria-keyshortcuts="t"
      onKeyDown={onKeyDown}
      className="mb-4 min-w-0 outline-offset-4"
    >
      <div id={id}>
        {keepDrawing ? <div hidden={asTable}>{children}</div> : asTable ? null : children}
        {asTable ? <ScrollRegion label={`${label}, as a table`}>{table}</ScrollRegion> : null}
      </div>
      <figcaption className="flex flex-wrap items-start gap-x-6 gap-y-1">
        {notes ? <div className="min-w-0 flex-1 basis-72">{notes}</div> : null}
        <button
          type="button"
          aria-controls={id}
          onClick={() => setAsTable((current) => !current)}
          className={
            quiet
              ? "sr-only focus:not-sr-only focus:min-h-6 focus:text-sm"
              : "ms-auto min-h-6 text-sm text-ink-2 underline decoration-rule underline-offset-4 hover:text-ink"
          }
          data-print="hide"
        >
          <span className="sr-only">{label},</span> {asTable ? "as a picture" : "as a table"}
          <span className="ms-1.5 text-xs" aria-hidden="true">
            T
          </span>
        </button>
      </figcaption>
    </figure>
  );
}
