import { Link } from "react-router-dom";
import { PersonMark } from "../../../components/person-mark/person-mark.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import type { PictureNode } from "../picture-nodes.ts";
import { plainLink } from "./plain-link.ts";

export type NodePanelProps = {
  node: PictureNode | null;
  personTo?: (id: string) => string;
  /** Draws one group alone; left out while one is. */
  onGroup?: (group: string) => void;
};

/** Who was tapped in the picture: study number, what the mark says, the group. Never a name. */
export function NodePanel({ node, personTo, onGroup }: NodePanelProps) {
  return (
    <div role="status" className="min-h-10 py-2 text-sm">
      {node === null ? (
        <p className="text-ink-2">
          Tap a mark to see whose it is. After a tap on the picture, dragging moves it and the wheel
          or two fingers bring it nearer.
        </p>
      ) : (
        <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
          <span className="inline-flex items-center gap-2 text-base font-bold">
            {node.level === "people" ? <PersonMark {...node.mark} decorative /> : null}
            {node.label}
          </span>
          {node.level === "people" ? (
            <>
              <span>{node.words}</span>
              <span>{formatCount(node.pairs, "contact pair drawn", "contact pairs drawn")}</span>
              <span>group {node.groupLabel}</span>
              {personTo ? (
                <Link to={personTo(node.id)} className={plainLink}>
                  Open the person's page
                </Link>
              ) : null}
            </>
          ) : (
            <span>{formatCount(node.size, "person", "people")}</span>
          )}
          {onGroup && (node.level === "groups" || node.pairs > 0) ? (
            <Button size="small" onClick={() => onGroup(node.group)}>
              Draw this group alone
            </Button>
          ) : null}
        </div>
      )}
    </div>
  );
}
