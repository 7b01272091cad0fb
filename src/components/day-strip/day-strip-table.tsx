import { formatDay } from "../../lib/formatters.ts";
import { Cell, HeadCell, Table } from "../ui/table.tsx";
import { type DayStripRow, dueWords } from "./day-strip-row.ts";

type Line = { what: string; from: string; to: string };

/** The same days as words: one line for each thing that the strip draws. */
export function DayStripTable({ label, rows }: { label: string; rows: readonly DayStripRow[] }) {
  return (
    <Table caption={label}>
      <thead>
        <tr>
          <HeadCell>row</HeadCell>
          <HeadCell>what</HeadCell>
          <HeadCell>first day</HeadCell>
          <HeadCell>last day</HeadCell>
        </tr>
      </thead>
      <tbody>
        {rows.flatMap((row) =>
          dayStripLines(row).map((line) => (
            <tr key={`${row.id} ${line.what} ${line.from} ${line.to}`}>
              <HeadCell scope="row">{row.label}</HeadCell>
              <Cell>{line.what}</Cell>
              <Cell className="whitespace-nowrap">{formatDay(line.from)}</Cell>
              <Cell className="whitespace-nowrap">{formatDay(line.to)}</Cell>
            </tr>
          )),
        )}
      </tbody>
    </Table>
  );
}

/** What a row says, line by line. */
export function dayStripLines(row: DayStripRow): Line[] {
  switch (row.type) {
    case "window": {
      const words = row.window === "source" ? "source window" : "infectious window";
      const known = row.from !== null && row.to !== null;
      const lines: Line[] = [
        {
          what: known ? words : `${words}: ${row.unknown ?? "not known"}`,
          from: row.from ?? "",
          to: row.to ?? "",
        },
      ];
      if (row.reference) {
        const { day, label } = row.reference;
        lines.push({ what: label, from: day, to: day });
      }
      return lines;
    }
    case "exposure":
      return row.bars.map(({ setting, from, to, partial }) => ({
        what: partial ? `${setting}, days not certain` : setting,
        from,
        to,
      }));
    case "group":
      return [{ what: `people not named: ${row.count}`, from: row.from, to: row.to }];
    case "due":
      return row.days.map(({ day, state }) => ({ what: dueWords[state], from: day, to: day }));
    case "onsets":
      return [
        ...row.counts
          .filter(({ count }) => count > 0)
          .map(({ day, count }) => ({
            what: `${count} ${count === 1 ? "onset" : "onsets"}${
              row.incompleteFrom && day >= row.incompleteFrom ? ", not complete yet" : ""
            }`,
            from: day,
            to: day,
          })),
        ...(row.joins ?? []).map(({ day, label }) => ({ what: label, from: day, to: day })),
      ];
  }
}
