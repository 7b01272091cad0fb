import { Popover } from "radix-ui";
import { Button } from "../ui/button.tsx";

export type ColumnChoiceProps = {
  columns: readonly { id: string; header: string; visible: boolean }[];
  onToggle: (id: string, visible: boolean) => void;
};

/** Which columns are shown: a list of boxes behind one button. */
export function ColumnChoice({ columns, onToggle }: ColumnChoiceProps) {
  return (
    <Popover.Root>
      <Popover.Trigger asChild>
        <Button size="small">Columns</Button>
      </Popover.Trigger>
      <Popover.Portal>
        <Popover.Content
          align="end"
          sideOffset={4}
          aria-label="Columns shown"
          className="z-30 max-h-[60vh] min-w-48 overflow-y-auto border border-ink bg-paper px-4 py-2"
        >
          {columns.map((column) => (
            <label key={column.id} className="flex min-h-8 items-center gap-2">
              <input
                type="checkbox"
                checked={column.visible}
                onChange={(event) => onToggle(column.id, event.target.checked)}
              />
              {column.header}
            </label>
          ))}
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  );
}
