import { useState } from "react";
import type { Import } from "../../../../shared/contracts/imports.ts";
import { CheckboxField } from "../../../components/fields/checkbox-field.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { errorWords } from "../../../lib/api-error.ts";
import { formatCount } from "../../../lib/formatters.ts";
import { useCommitImport } from "../api/commit-import.ts";
import { countOf, rowsToCommit } from "../import-words.ts";

export type CommitFormProps = { investigationId: string; staged: Import };

/** The decision: put the good rows on record, with or without people only the pairs name. */
export function CommitForm({ investigationId, staged }: CommitFormProps) {
  const [createMissing, setCreateMissing] = useState(staged.createMissing);
  const commit = useCommitImport(investigationId, staged.id);
  const missing = countOf(staged, "unknownRefs");
  const count = rowsToCommit(staged, createMissing);
  const aside = countOf(staged, "setAside");
  return (
    <div className="mb-8">
      {staged.kind === "pairs" && missing > 0 ? (
        <CheckboxField
          label="Create missing people"
          hint={`Makes ${formatCount(missing, "new person", "new people")} with a reference and nothing else: no name, not classified. Leave it off when the people file is still to come, or a mistyped reference becomes a person.`}
          checked={createMissing}
          onChange={(event) => setCreateMissing(event.target.checked)}
          className="mb-4 max-w-[70ch]"
        />
      ) : null}
      {commit.isError ? (
        <Notice tone="error" title="Not started." className="mb-3">
          {errorWords(commit.error)}.
        </Notice>
      ) : null}
      {count + aside > 0 ? (
        <Button
          variant="primary"
          pending={commit.isPending}
          onClick={() => commit.mutate(createMissing)}
        >
          {count > 0
            ? `Put ${formatCount(count, "row", "rows")} on record`
            : `Go on to ${formatCount(aside, "row", "rows")} to decide`}
        </Button>
      ) : (
        <p>No row of this file can be put on record as it is.</p>
      )}
    </div>
  );
}
