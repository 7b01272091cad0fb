import { Link } from "react-router-dom";
import type { AccessEvent } from "../../../shared/contracts/safeguard.ts";
import { paths } from "../../app/paths.ts";
import type { DataColumn } from "../../components/data-table/data-column.ts";
import { formatCount, formatInstant, formatNumber, noValue } from "../../lib/formatters.ts";
import { actionWord, roleWord } from "./safeguard-words.ts";

const FEW = 4;

/** People of an event by study number; many are folded away behind their count. */
function People({ event, investigationId }: { event: AccessEvent; investigationId: string }) {
  const { studyNumbers, personIds } = event;
  if (studyNumbers.length === 0) return <>{noValue}</>;
  // Ids and numbers pair up unless somebody has left the record meanwhile.
  const paired = studyNumbers.length === personIds.length;
  const one = (number: string, index: number) => {
    const id = paired ? personIds[index] : undefined;
    return id ? (
      <Link key={number} to={paths.person(investigationId, id)} className="me-3 underline">
        {number}
      </Link>
    ) : (
      <span key={number} className="me-3">
        {number}
      </span>
    );
  };
  if (studyNumbers.length <= FEW) return <>{studyNumbers.map(one)}</>;
  return (
    <details>
      <summary>{formatCount(studyNumbers.length, "person", "people")}</summary>
      <div className="max-w-prose whitespace-normal py-1">{studyNumbers.map(one)}</div>
    </details>
  );
}

function counts(event: AccessEvent): string {
  const parts = Object.entries(event.counts).map(
    ([name, count]) =>
      `${name.replaceAll("_", " ")} ${typeof count === "number" ? formatNumber(count) : count}`,
  );
  return parts.length === 0 ? noValue : parts.join(", ");
}

/** Columns of the access record. */
export function eventColumns(investigationId: string, timeZone: string): DataColumn<AccessEvent>[] {
  return [
    {
      id: "at",
      header: "When",
      rowHeader: true,
      cell: (event) => formatInstant(event.at, timeZone),
    },
    { id: "who", header: "Who", cell: (event) => event.displayName ?? "the system" },
    { id: "role", header: "Acting as", cell: (event) => roleWord(event.role) },
    { id: "action", header: "What", cell: (event) => actionWord(event.action) },
    {
      id: "fields",
      header: "Fields",
      wrap: true,
      cell: (event) => (event.fields.length === 0 ? noValue : event.fields.join(", ")),
    },
    {
      id: "people",
      header: "People",
      cell: (event) => <People event={event} investigationId={investigationId} />,
    },
    { id: "counts", header: "Counts", wrap: true, cell: counts },
  ];
}
