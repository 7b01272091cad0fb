import { Button } from "../../../components/ui/button.tsx";
import { formatCount } from "../../../lib/formatters.ts";

export type SaveBarProps = {
  changes: number;
  /** The preview of exactly these values was shown. */
  previewed: boolean;
  /** One was shown, and something was typed since. */
  outdated: boolean;
  asking: boolean;
  saving: boolean;
  onAsk: () => void;
  onSave: () => void;
  onPutBack: () => void;
};

/** What is not saved yet, at the foot of the window: ask first, then save. */
export function SaveBar(props: SaveBarProps) {
  const { changes, previewed, outdated, asking, saving } = props;
  return (
    <div
      data-save-bar=""
      className="sticky bottom-0 z-20 -mx-4 flex flex-wrap items-center gap-x-4 gap-y-2 border-t
        border-ink bg-paper px-4 py-2 sm:-mx-6 sm:px-6"
    >
      <p role="status" className="me-auto">
        <strong>{formatCount(changes, "change", "changes")} not saved.</strong>{" "}
        <span className="text-sm text-ink-2">
          {previewed
            ? "What would move is shown above."
            : outdated
              ? "Changed since you looked; see again what would move, then save."
              : "See what would move, then save."}
        </span>
      </p>
      <div className="flex flex-wrap gap-2">
        <Button variant="plain" onClick={props.onPutBack}>
          Put all back
        </Button>
        <Button
          variant={previewed ? "quiet" : "primary"}
          pending={asking}
          pendingLabel="Counting"
          onClick={props.onAsk}
        >
          See what would move
        </Button>
        <Button
          variant={previewed ? "primary" : "quiet"}
          disabled={!previewed}
          pending={saving}
          pendingLabel="Saving"
          onClick={props.onSave}
        >
          Save
        </Button>
      </div>
    </div>
  );
}
