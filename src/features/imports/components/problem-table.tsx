import { useMemo, useState } from "react";
import type { Import } from "../../../../shared/contracts/imports.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Pagination } from "../../../components/ui/pagination.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { fieldWords } from "../../../lib/field-words.ts";
import { formatCount, formatNumber } from "../../../lib/formatters.ts";
import { saveText } from "../../../lib/save-text.ts";
import { toCsv } from "../../../lib/to-csv.ts";

const pageSize = 25;
/** Kinds of problem named above the table, where it does not say each just once anyway. */
const mostKinds = 8;

export type ProblemTableProps = { problems: Import["problems"]; problemCount: number };

const columnWords = (column: string) => (column === "row" ? "whole row" : column);

type Kind = { column: string; code: string; count: number };

/** Listed problems by column and code, the most frequent first. */
function kindsOf(problems: Import["problems"]): Kind[] {
  const kinds = new Map<string, Kind>();
  for (const { column, code } of problems) {
    const key = `${column} ${code}`;
    const kind = kinds.get(key) ?? { column, code, count: 0 };
    kind.count += 1;
    kinds.set(key, kind);
  }
  return [...kinds.values()].sort((a, b) => b.count - a.count);
}

/** What is wrong where: line of the file, column, meaning. Values stay in the file. */
export function ProblemTable({ problems, problemCount }: ProblemTableProps) {
  const [page, setPage] = useState(1);
  const kinds = useMemo(() => kindsOf(problems), [problems]);
  const last = Math.max(1, Math.ceil(problems.length / pageSize));
  const shown = Math.min(page, last);
  const rows = problems.slice((shown - 1) * pageSize, shown * pageSize);
  function download() {
    const cells = problems.map(({ line, column, code }) => [line, column, code] as const);
    saveText("import-problems.csv", toCsv(["line", "column", "code"], cells));
  }
  return (
    <Section
      title="Problems"
      subLine={
        problemCount > problems.length
          ? `${formatCount(problemCount, "problem", "problems")}, the first ${formatNumber(problems.length)} listed`
          : formatCount(problemCount, "problem", "problems")
      }
      actions={<Button onClick={download}>Download as CSV</Button>}
    >
      {kinds.length < problems.length && (kinds.length > 1 || last > 1) ? (
        <ul className="mb-3 max-w-[70ch] text-ink-2">
          {kinds.slice(0, mostKinds).map(({ column, code, count }) => (
            <li key={`${column} ${code}`}>
              {formatNumber(count)} × {columnWords(column)}: {fieldWords(code)}
            </li>
          ))}
          {kinds.length > mostKinds ? <li>and other kinds</li> : null}
        </ul>
      ) : null}
      <Table caption="Problems by line of the file; the heading is line 1" hideCaption>
        <thead>
          <tr>
            <HeadCell numeric className="w-16">
              Line
            </HeadCell>
            <HeadCell className="sm:w-48">Column</HeadCell>
            <HeadCell>Meaning</HeadCell>
          </tr>
        </thead>
        <tbody>
          {rows.map(({ line, column, code }, at) => (
            // A cell can have one problem of a code only, but a line can come twice.
            // biome-ignore lint/suspicious/noArrayIndexKey: rows never move
            <tr key={`${line} ${column} ${code} ${at}`}>
              <Cell numeric>{formatNumber(line)}</Cell>
              <Cell>{columnWords(column)}</Cell>
              <Cell>{fieldWords(code)}</Cell>
            </tr>
          ))}
        </tbody>
      </Table>
      {problems.length > pageSize ? (
        <Pagination
          page={shown}
          pageSize={pageSize}
          total={problems.length}
          onPageChange={setPage}
          noun="problems"
        />
      ) : null}
    </Section>
  );
}
