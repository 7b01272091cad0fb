import { clsx } from "clsx";
import type { ComponentProps, ReactNode } from "react";

export type TableProps = ComponentProps<"table"> & {
  /** Says what the rows are; kept for readers only with `hideCaption`. */
  caption: ReactNode;
  hideCaption?: boolean;
};

/** A table of hairlines: strong rule above the head, hairline under each row. */
export function Table({ caption, hideCaption = false, className, children, ...rest }: TableProps) {
  return (
    <table {...rest} className={clsx("w-full border-collapse border-t border-ink", className)}>
      <caption className={hideCaption ? "sr-only" : "pb-1.5 text-start text-sm text-ink-2"}>
        {caption}
      </caption>
      {children}
    </table>
  );
}

export type HeadCellProps = ComponentProps<"th"> & { numeric?: boolean };

/** A column or row head; figures are set to the end of the line, words to the start. */
export function HeadCell({ numeric = false, className, scope = "col", ...rest }: HeadCellProps) {
  return (
    <th
      {...rest}
      scope={scope}
      className={clsx(
        "border-b border-rule px-2 py-1.5 text-sm font-normal first:ps-0 last:pe-0",
        scope === "row"
          ? "align-baseline text-[0.9375rem] text-ink"
          : scope === "col"
            ? "align-bottom text-ink-2"
            : "align-bottom text-[0.9375rem] text-ink",
        numeric ? "text-end" : "text-start",
        className,
      )}
    />
  );
}

export type CellProps = ComponentProps<"td"> & {
  numeric?: boolean;
  /** Not final yet: grey and slanted, never counted as failed. */
  pending?: boolean;
};

/** A table cell. */
export function Cell({ numeric = false, pending = false, className, ...rest }: CellProps) {
  return (
    <td
      {...rest}
      className={clsx(
        "border-b border-rule px-2 py-1.5 align-baseline first:ps-0 last:pe-0",
        numeric && "whitespace-nowrap text-end",
        pending && "italic text-ink-2",
        className,
      )}
    />
  );
}
