import { Link } from "react-router-dom";
import { formatNumber } from "../../lib/formatters.ts";
import { withGaps } from "./use-virtual-rows.ts";
import type { DrawnRows, VirtualTableProps } from "./virtual-table.tsx";

export type VirtualCardsProps<Row extends object> = VirtualTableProps<Row> & {
  drawn: DrawnRows<Row>;
};

/** Each row on two lines, for pages too narrow for columns: nothing is scrolled sideways. */
export function VirtualCards<Row extends object>(props: VirtualCardsProps<Row>) {
  const { drawn, caption, total } = props;
  const { parts, after } = withGaps(drawn.items, drawn.height);
  return (
    <ul aria-label={caption} className="border-t border-ink" style={{ paddingBottom: after }}>
      {parts.map(({ index, before }) => (
        <li
          key={index}
          aria-setsize={total}
          aria-posinset={index + 1}
          style={{ marginTop: before }}
          className="flex h-17 items-center gap-3 border-b border-rule"
        >
          <Card {...props} index={index} />
        </li>
      ))}
    </ul>
  );
}

function Card<Row extends object>({
  index,
  rowAt,
  rowTo,
  card,
  selection,
  drawn,
}: VirtualCardsProps<Row> & { index: number }) {
  const row = rowAt(index);
  if (row === undefined) {
    return (
      <p className="text-sm text-ink-2" aria-busy="true">
        Row {formatNumber(index + 1)} is on its way
      </p>
    );
  }
  const { title, more } = card(row);
  return (
    <>
      {selection ? (
        <input
          type="checkbox"
          className="size-5 shrink-0"
          aria-label={selection.label(row)}
          checked={selection.isSelected(row)}
          onChange={() => selection.toggle(row)}
        />
      ) : null}
      <Link
        to={rowTo(row)}
        data-row={index}
        className="flex h-full min-w-0 flex-1 flex-col justify-center"
        onKeyDown={(event) => {
          if (event.key !== "Enter") drawn.actions.onKeyDown(event, index);
        }}
        onFocus={() => drawn.actions.onFocus(index)}
      >
        <span className="truncate">{title}</span>
        <span className="truncate text-sm text-ink-2">{more}</span>
      </Link>
    </>
  );
}
