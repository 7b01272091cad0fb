import { useState } from "react";
import { CASE_CLASSIFICATIONS } from "../../../../shared/vocabulary.ts";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { classificationWords } from "../../../lib/words.ts";
import { useMakeCase } from "../api/make-case.ts";

const options = [...CASE_CLASSIFICATIONS]
  .reverse()
  .map((value) => ({ value, label: classificationWords[value] }));

export type MakeCaseProps = {
  investigationId: string;
  person: { id: string; version: number; called: string };
};

/** A contact who meets the case definition becomes a case; the checks made so far stay. */
export function MakeCase({ investigationId, person }: MakeCaseProps) {
  const [open, setOpen] = useState(false);
  const [classification, setClassification] = useState("suspected");
  const change = useMakeCase(investigationId, person.id);
  const toast = useToast();
  return (
    <>
      <Button size="small" variant="plain" onClick={() => setOpen(true)}>
        meets the definition
      </Button>
      <ConfirmDialog
        open={open}
        onOpenChange={setOpen}
        title={`${person.called} becomes a case`}
        description="Follow-up ends and the checks made so far stay on the record. The classification can be changed on the person's page."
        confirmLabel="Make a case"
        pending={change.isPending}
        onConfirm={() =>
          change.mutate(
            { version: person.version, classification },
            {
              onSuccess() {
                setOpen(false);
                toast({ text: `${person.called} is a case now`, tone: "done" });
              },
            },
          )
        }
      >
        <RadioRow
          label="Classification"
          name={`case-${person.id}`}
          options={options}
          value={classification}
          onChange={(event) => setClassification(event.target.value)}
        />
        {change.isError ? (
          <Notice tone="error" title="Not changed." className="mt-3">
            {errorWords(change.error)}.
          </Notice>
        ) : null}
      </ConfirmDialog>
    </>
  );
}
