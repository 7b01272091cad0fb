export type RowToolsProps = {
  row: number;
  noun: string;
  /** Undefined for the first row, which has none above. */
  onCarry: (() => void) | undefined;
  onRemove: () => void;
};

const look =
  "min-h-9 min-w-7 px-1 text-ink-2 hover:text-ink hover:bg-paper-2 rounded-[2px] " +
  "pointer-coarse:min-h-11 pointer-coarse:px-1.5";

/**
 * Same as above, and taking the row away. Outside the order of Tab, so that a row ends with its
 * last box; the keys are named on the page and in aria-keyshortcuts.
 */
export function RowTools({ row, noun, onCarry, onRemove }: RowToolsProps) {
  return (
    <div
      // Stacked rows have their tools beside the heading, wide ones at the end of the line.
      className="order-first flex flex-wrap items-center justify-end gap-x-2 lg:col-span-6
        min-[85rem]:order-none min-[85rem]:col-span-1 min-[85rem]:flex-nowrap min-[85rem]:gap-x-0
        min-[85rem]:self-start"
    >
      {onCarry ? (
        <button
          type="button"
          tabIndex={-1}
          aria-keyshortcuts="Control+'"
          title="Setting, place and days as in the row above (Ctrl ')"
          className={look}
          onClick={onCarry}
        >
          <span aria-hidden="true" className="hidden min-[85rem]:inline">
            ″
          </span>
          <span className="text-sm underline underline-offset-4 min-[85rem]:sr-only">as above</span>
        </button>
      ) : null}
      <button
        type="button"
        tabIndex={-1}
        aria-keyshortcuts="Control+Shift+Backspace"
        title="Take this row away (Ctrl Shift Backspace)"
        className={look}
        onClick={onRemove}
      >
        <span aria-hidden="true" className="hidden min-[85rem]:inline">
          ×
        </span>
        <span className="text-sm underline underline-offset-4 min-[85rem]:sr-only">take away</span>
        <span className="sr-only">
          {noun} {row + 1}
        </span>
      </button>
    </div>
  );
}
