import type { FollowEndEntry } from "../../../../shared/contracts/follow-up.ts";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatDay, formatInstant } from "../../../lib/formatters.ts";
import { endWords } from "../../../lib/words.ts";

export type EndsTableProps = { ends: readonly FollowEndEntry[]; timeZone: string };

/** Recorded ends of a follow-up with who set them and who took them back. */
export function EndsTable({ ends, timeZone }: EndsTableProps) {
  const said = (at: string | null, by: string | null) =>
    at === null ? "–" : `${formatInstant(at, timeZone)}${by === null ? "" : `, ${by}`}`;
  return (
    <ScrollRegion label="Table of recorded ends" className="mt-3">
      <Table caption="Recorded ends">
        <thead>
          <tr>
            {["day", "why", "entered", "taken back"].map((head) => (
              <HeadCell key={head}>{head}</HeadCell>
            ))}
          </tr>
        </thead>
        <tbody>
          {ends.map((end) => (
            <tr key={end.id}>
              <HeadCell scope="row">{formatDay(end.day)}</HeadCell>
              <Cell>{endWords[end.reason]}</Cell>
              <Cell>{said(end.recordedAt, end.recordedBy)}</Cell>
              <Cell>{said(end.takenBackAt, end.takenBackBy)}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
    </ScrollRegion>
  );
}
