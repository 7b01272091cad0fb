import {
  type HeadingsAnswer,
  type Import,
  PAIR_COLUMNS,
  PEOPLE_COLUMNS,
} from "../../../../shared/contracts/imports.ts";
import { SelectField } from "../../../components/fields/select-field.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import { formatCount } from "../../../lib/formatters.ts";
import { formWords, howWords, type Mapping, mappingErrors } from "../import-words.ts";

export type ColumnMappingProps = {
  kind: Import["kind"];
  found: HeadingsAnswer;
  mapping: Mapping;
  onChange: (mapping: Mapping) => void;
};

/** What was found in the first line of a file, and which column each of its columns is. */
export function ColumnMapping({ kind, found, mapping, onChange }: ColumnMappingProps) {
  const columns: readonly string[] = kind === "people" ? PEOPLE_COLUMNS : PAIR_COLUMNS;
  const errors = mappingErrors(kind, mapping);
  const leftOut = mapping.filter((column) => column === null).length;
  return (
    <fieldset className="mt-5">
      <legend className="text-sm font-bold">Columns of the file</legend>
      <p className="mb-2 max-w-[70ch] text-sm text-ink-2">
        {formWords(found)} What each heading is taken for can be changed.
        {leftOut > 0
          ? ` ${formatCount(leftOut, "column is", "columns are")} left out: nothing of ${leftOut === 1 ? "it" : "them"} is read.`
          : ""}
      </p>
      <Table caption="Headings of the file and the columns they are taken for" hideCaption>
        <thead>
          <tr>
            <HeadCell numeric className="w-10 max-sm:hidden">
              No.
            </HeadCell>
            <HeadCell className="max-sm:ps-0">Heading in the file</HeadCell>
            <HeadCell className="w-[46%] sm:w-56">Taken for</HeadCell>
          </tr>
        </thead>
        <tbody>
          {found.columns.map(({ heading, column, how }, at) => {
            const chosen = mapping[at] ?? null;
            const words = chosen === column ? howWords[how] : "changed by you";
            return (
              // biome-ignore lint/suspicious/noArrayIndexKey: a column is its place
              <tr key={at}>
                <Cell numeric className="max-sm:hidden">
                  {at + 1}
                </Cell>
                <Cell className="break-words max-sm:ps-0">
                  <bdi>{heading === "" ? "(no heading)" : heading}</bdi>
                  <span className="block text-sm text-ink-2">{words}</span>
                </Cell>
                <Cell>
                  <SelectField
                    label={`Column ${at + 1} is taken for`}
                    hideLabel
                    value={chosen ?? ""}
                    emptyLabel="leave out"
                    options={columns.map((name) => ({ value: name, label: name }))}
                    error={errors.twice.has(at) ? "chosen twice" : undefined}
                    onChange={(event) =>
                      onChange(
                        mapping.map((one, place) =>
                          place === at ? event.target.value || null : one,
                        ),
                      )
                    }
                  />
                </Cell>
              </tr>
            );
          })}
        </tbody>
      </Table>
    </fieldset>
  );
}
