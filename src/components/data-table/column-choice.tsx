import { DropPanel } from "../ui/drop-panel.tsx";

export type ColumnChoiceProps = {
  columns: readonly { id: string; header: string; visible: boolean }[];
  onToggle: (id: string, visible: boolean) => void;
};

/** Which columns are shown: a list of boxes behind one button. */
export function ColumnChoice({ columns, onToggle }: ColumnChoiceProps) {
  return (
    <DropPanel label="Columns" panelLabel="Columns shown" className="w-max">
      {() =>
        columns.map((column) => (
          <label key={column.id} className="flex min-h-8 items-center gap-2">
            <input
              type="checkbox"
              checked={column.visible}
              onChange={(event) => onToggle(column.id, event.target.checked)}
            />
            {column.header}
          </label>
        ))
      }
    </DropPanel>
  );
}
