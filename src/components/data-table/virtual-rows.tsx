import { memo, type ReactNode } from "react";
import { formatNumber } from "../../lib/formatters.ts";
import { Table } from "../ui/table.tsx";
import { ColumnHead } from "./column-head.tsx";
import type { DataColumn } from "./data-column.ts";
import { RowCell } from "./row-cell.tsx";
import { withGaps } from "./use-virtual-rows.ts";
import type { DrawnRows, RowActions, VirtualTableProps } from "./virtual-table.tsx";

const normalWidth = 128;
const boxWidth = 34;

export type VirtualRowsProps<Row extends object> = VirtualTableProps<Row> & {
  drawn: DrawnRows<Row>;
  rowHeight: number;
};

function Gap({ height, span }: { height: number; span: number }) {
  if (height <= 0) return null;
  return (
    // biome-ignore lint/a11y/noAriaHiddenOnFocusable: a row without a tab index takes no focus
    <tr aria-hidden="true" style={{ height }}>
      <td colSpan={span} className="p-0" />
    </tr>
  );
}

/** Rows under columns of set widths, so that nothing moves while rows come and go. */
export function VirtualRows<Row extends object>(props: VirtualRowsProps<Row>) {
  const { columns, selection, drawn, total } = props;
  const headId = (columns.find((column) => column.rowHeader) ?? columns[0])?.id;
  const span = columns.length + (selection ? 1 : 0);
  const width = columns.reduce((sum, one) => sum + (one.width ?? normalWidth), 0);
  const { parts, after } = withGaps(drawn.items, drawn.height);
  return (
    <Table
      caption={props.caption}
      hideCaption
      className="table-fixed"
      style={{ minWidth: width + (selection ? boxWidth : 0) }}
      aria-rowcount={total + 1}
    >
      <colgroup>
        {selection ? <col style={{ width: boxWidth }} /> : null}
        {columns.map((column) => (
          <col key={column.id} style={{ width: column.width ?? normalWidth }} />
        ))}
      </colgroup>
      <thead className="sticky top-0 z-10 bg-paper">
        <tr aria-rowindex={1}>
          {selection ? (
            <td className="border-b border-rule">
              <span className="sr-only">Selected</span>
            </td>
          ) : null}
          {columns.map((column) => (
            <ColumnHead
              key={column.id}
              column={column}
              sort={props.sort}
              onSortChange={props.onSortChange}
            />
          ))}
        </tr>
      </thead>
      <tbody>
        {parts.map(({ index, before }) => (
          <Placed key={index} {...props} {...{ index, before, headId, span }} />
        ))}
        <Gap height={after} span={span} />
      </tbody>
    </Table>
  );
}

type PlacedProps<Row extends object> = VirtualRowsProps<Row> & {
  index: number;
  before: number;
  headId: string | undefined;
  span: number;
};

function Placed<Row extends object>(props: PlacedProps<Row>) {
  const { index, before, span, drawn, selection, columns, headId, rowHeight } = props;
  const row = props.rowAt(index);
  return (
    <>
      <Gap height={before} span={span} />
      <VirtualRow<Row>
        {...{ index, span, columns, headId, row }}
        height={rowHeight}
        active={index === drawn.active}
        selected={row === undefined ? false : selection?.isSelected(row)}
        selectLabel={row === undefined ? undefined : selection?.label(row)}
        actions={drawn.actions}
      />
    </>
  );
}

type VirtualRowProps<Row extends object> = {
  index: number;
  span: number;
  columns: readonly DataColumn<Row>[];
  headId: string | undefined;
  row: Row | undefined;
  height: number;
  active: boolean;
  /** Undefined where rows cannot be selected. */
  selected: boolean | undefined;
  selectLabel: string | undefined;
  actions: RowActions<Row>;
};

const VirtualRow = memo(function VirtualRow<Row extends object>(props: VirtualRowProps<Row>) {
  const { index, span, columns, headId, row, active, selected, selectLabel, actions } = props;
  return (
    <tr
      data-row={index}
      aria-rowindex={index + 2}
      aria-busy={row === undefined || undefined}
      style={{ height: props.height }}
      tabIndex={active ? 0 : -1}
      className={`cursor-pointer hover:bg-paper-2 focus-visible:outline-offset-0 ${selected ? "bg-paper-2" : ""}`}
      onKeyDown={(event) => actions.onKeyDown(event, index)}
      onFocus={() => actions.onFocus(index)}
      onClick={(event) => {
        // A link, button or marked text inside the row keeps its own meaning.
        const inner = (event.target as Element).closest("a,button,input,select,label");
        if (inner || window.getSelection()?.toString() || row === undefined) return;
        actions.open(row);
      }}
    >
      {row === undefined ? (
        <td colSpan={span} className="border-b border-rule px-2">
          <span className="sr-only">Row {formatNumber(index + 1)} is on its way</span>
          <span aria-hidden="true" className="block h-3 w-2/5 bg-paper-2" />
        </td>
      ) : (
        <>
          {selectLabel !== undefined ? (
            <td className="border-b border-rule">
              <input
                type="checkbox"
                // Not in the tab order: the row is, and Space on it does the same.
                tabIndex={-1}
                // A grid, as every box is: the tick is a child of it.
                className="grid"
                aria-label={selectLabel}
                checked={selected ?? false}
                onChange={() => actions.toggle(row)}
              />
            </td>
          ) : null}
          {columns.map((column) => (
            <RowCell
              key={column.id}
              column={column}
              row={row}
              clip
              to={column.id === headId ? actions.rowTo(row) : undefined}
              head={column.id === headId}
            />
          ))}
        </>
      )}
    </tr>
  );
}) as <Row extends object>(props: VirtualRowProps<Row>) => ReactNode;
