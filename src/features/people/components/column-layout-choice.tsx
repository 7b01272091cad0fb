import { Button } from "../../../components/ui/button.tsx";
import { DropPanel } from "../../../components/ui/drop-panel.tsx";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";
import type { ColumnLayout, ColumnWidth } from "../use-column-layout.ts";

const widths: { value: ColumnWidth; label: string }[] = [
  { value: "narrow", label: "narrow" },
  { value: "normal", label: "normal" },
  { value: "wide", label: "wide" },
];

/** Which columns are shown, how wide, and in which order; kept on this device. */
export function ColumnLayoutChoice({ layout }: { layout: ColumnLayout }) {
  const columns = layout.ordered.filter((column) => column.hideable !== false);
  return (
    <DropPanel
      label="Columns"
      panelLabel="Columns shown"
      size="normal"
      className="w-max max-sm:fixed max-sm:inset-x-3 max-sm:top-14 max-sm:w-auto"
    >
      {() => (
        <ul>
          {columns.map((column, place) => (
            <li key={column.id} className="flex min-h-9 items-center gap-2">
              <label className="flex min-w-40 flex-1 items-center gap-2">
                <input
                  type="checkbox"
                  checked={layout.isShown(column.id)}
                  onChange={(event) => layout.show(column.id, event.target.checked)}
                />
                {column.header}
              </label>
              <MenuSelect
                label={`Width of ${column.header}`}
                hideLabel
                size="small"
                options={widths}
                value={layout.widthOf(column.id)}
                disabled={!layout.isShown(column.id)}
                onValueChange={(width) => layout.setWidth(column.id, width)}
              />
              <Button
                size="small"
                variant="plain"
                disabled={place === 0}
                aria-label={`Move ${column.header} earlier`}
                onClick={() => layout.move(column.id, -1)}
              >
                <Arrow up />
              </Button>
              <Button
                size="small"
                variant="plain"
                disabled={place === columns.length - 1}
                aria-label={`Move ${column.header} later`}
                onClick={() => layout.move(column.id, 1)}
              >
                <Arrow />
              </Button>
            </li>
          ))}
        </ul>
      )}
    </DropPanel>
  );
}

function Arrow({ up = false }: { up?: boolean }) {
  return (
    <svg viewBox="0 0 8 6" className="size-2.5" aria-hidden="true">
      <path d={up ? "M4 0 8 6H0Z" : "M0 0h8L4 6Z"} fill="currentColor" />
    </svg>
  );
}
