import type { Export } from "../../../shared/contracts/exports.ts";
import { ROLE_NAMES } from "../../../shared/roles.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { Button } from "../../components/ui/button.tsx";
import { formatInstant, formatNumber, noValue } from "../../lib/formatters.ts";
import { fileWords, purposeWords, stateWords } from "./export-words.ts";

const purpose = (one: Export) =>
  one.reason ? `${purposeWords[one.purpose]}: ${one.reason}` : purposeWords[one.purpose];

/** A checksum, folded: its first figures tell files apart, the whole proves one. */
function Checksum({ one }: { one: Export }) {
  if (!one.sha256) return <>{noValue}</>;
  return (
    <details>
      <summary>
        {one.sha256.slice(0, 8)}
        <span className="sr-only"> SHA-256 of {one.fileName}</span>
      </summary>
      <span className="block max-w-[20rem] break-all whitespace-normal text-sm">{one.sha256}</span>
    </details>
  );
}

/** Columns of the record of exports; a data officer may also end one of somebody else's. */
export function exportColumns(
  timeZone: string,
  accountId: string,
  onRemove: (one: Export) => void,
): DataColumn<Export>[] {
  return [
    {
      id: "recordedAt",
      header: "When",
      rowHeader: true,
      cell: (one) => formatInstant(one.recordedAt, timeZone),
    },
    {
      id: "who",
      header: "Who",
      cell: (one) => (one.accountId === accountId ? "you" : (one.displayName ?? noValue)),
    },
    { id: "role", header: "Acting as", cell: (one) => ROLE_NAMES[one.role] },
    { id: "file", header: "What", wrap: true, cell: fileWords },
    { id: "purpose", header: "What for", wrap: true, cell: purpose },
    { id: "state", header: "State", cell: (one) => stateWords[one.state] },
    {
      id: "rows",
      header: "Rows",
      numeric: true,
      cell: (one) => (one.sha256 ? formatNumber(one.rows) : noValue),
    },
    {
      id: "downloads",
      header: "Fetched",
      numeric: true,
      cell: (one) => (one.sha256 ? `${formatNumber(one.downloads)} ×` : noValue),
    },
    { id: "name", header: "File", cell: (one) => one.fileName },
    { id: "sha256", header: "SHA-256", cell: (one) => <Checksum one={one} /> },
    {
      id: "end",
      header: "Ending it",
      cell: (one) =>
        one.can.remove && one.accountId !== accountId ? (
          <Button size="small" onClick={() => onRemove(one)}>
            {one.state === "building" ? "Cancel" : "Delete"}
            <span className="sr-only"> {one.fileName}</span>
          </Button>
        ) : (
          noValue
        ),
    },
  ];
}
