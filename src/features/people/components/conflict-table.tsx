import { Answer } from "../../../components/ui/answer.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ErrorState } from "../../../components/ui/error-state.tsx";
import { ScrollRegion } from "../../../components/ui/scroll-region.tsx";
import { Cell, HeadCell, Table } from "../../../components/ui/table.tsx";
import type { PersonField, PersonValues } from "../person-fields.ts";

export type ConflictTableProps = {
  fields: readonly PersonField[];
  begun: PersonValues;
  saved: PersonValues;
  yours: PersonValues;
  pending: boolean;
  onKeepSaved: () => void;
  onSaveMine: () => void;
};

/** Somebody saved first: what it was, what is saved now, what was typed here, and the choice. */
export function ConflictTable(props: ConflictTableProps) {
  const { fields, begun, saved, yours, pending, onKeepSaved, onSaveMine } = props;
  return (
    <div className="mb-4">
      <ErrorState
        kind="conflict"
        actions={
          <>
            <Button onClick={onKeepSaved}>Keep what is saved</Button>
            <Button variant="primary" pending={pending} onClick={onSaveMine}>
              Save mine over it
            </Button>
          </>
        }
      >
        Only the fields you changed are at stake; the rest of the record stays as it was saved.
      </ErrorState>
      <ScrollRegion label="Changed fields" className="mt-3">
        <Table caption="The fields you changed">
          <thead>
            <tr>
              <HeadCell>field</HeadCell>
              <HeadCell>when you began</HeadCell>
              <HeadCell>saved now</HeadCell>
              <HeadCell>yours</HeadCell>
            </tr>
          </thead>
          <tbody>
            {fields.map(({ key, label }) => (
              <tr key={key}>
                <HeadCell scope="row">{label}</HeadCell>
                <Cell>
                  <Answer value={begun[key]} />
                </Cell>
                <Cell className={saved[key] === begun[key] ? "" : "font-bold text-coral"}>
                  <Answer value={saved[key]} />
                </Cell>
                <Cell className="font-bold">
                  <Answer value={yours[key]} />
                </Cell>
              </tr>
            ))}
          </tbody>
        </Table>
      </ScrollRegion>
    </div>
  );
}
