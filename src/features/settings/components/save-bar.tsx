import { Button } from "../../../components/ui/button.tsx";
import { formatCount } from "../../../lib/formatters.ts";

export type SaveBarProps = {
  changes: number;
  /** What is to be done next, or what is in the way. */
  hint: string;
  /** Somebody else saved first; where both values stand. */
  clash: boolean;
  /** The preview of exactly these values was shown. */
  previewed: boolean;
  asking: boolean;
  saving: boolean;
  onAsk: () => void;
  onSave: () => void;
  onPutBack: () => void;
};

/** What is not saved yet, at the foot of the window: ask first, then save. */
export function SaveBar(props: SaveBarProps) {
  const { changes, hint, clash, previewed, asking, saving } = props;
  return (
    <div
      data-save-bar=""
      className="sticky bottom-0 z-20 -mx-4 flex flex-wrap items-center gap-x-3 gap-y-2 border-t
        border-ink bg-paper px-4 py-2 sm:-mx-6 sm:px-6"
    >
      <p role="status" className="me-auto">
        <strong>{formatCount(changes, "change", "changes")} not saved.</strong>{" "}
        <span className="text-sm text-ink-2 max-sm:sr-only">{hint}</span>
      </p>
      {clash ? (
        <a
          href="#clash"
          className="inline-flex min-h-6 items-center text-sm text-coral underline underline-offset-4"
        >
          Someone else saved first
        </a>
      ) : null}
      <Button variant="plain" className="max-sm:px-0!" onClick={props.onPutBack}>
        Put all back
      </Button>
      <div className="flex gap-2 max-sm:w-full max-sm:*:grow">
        <Button
          variant={previewed ? "quiet" : "primary"}
          pending={asking}
          pendingLabel="Counting"
          className="max-sm:px-2"
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
