import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { LIMITS } from "../../../../shared/contracts/common.ts";
import { paths } from "../../../app/paths.ts";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { ApiError } from "../../../lib/api-error.ts";
import { useStageImport } from "../api/stage-import.ts";
import { ColumnHelp } from "./column-help.tsx";
import { FileDrop } from "./file-drop.tsx";
import { RefusedFile } from "./refused-file.tsx";

type Kind = "people" | "pairs";

export type ImportFormProps = { investigationId: string };

/** Chooses a kind and a file and has it checked; the checked file opens on a page of its own. */
export function ImportForm({ investigationId }: ImportFormProps) {
  const navigate = useNavigate();
  const stage = useStageImport(investigationId);
  const [kind, setKind] = useState<Kind>("people");
  const [file, setFile] = useState<File | null>(null);
  const [idempotencyKey, setIdempotencyKey] = useState(() => crypto.randomUUID());
  const [missing, setMissing] = useState(false);
  const tooLarge = file !== null && file.size > LIMITS.fileBytes;

  function change(next: () => void) {
    next();
    setMissing(false);
    stage.reset();
    // Another file or kind is another request.
    setIdempotencyKey(crypto.randomUUID());
  }

  function check() {
    if (!file) {
      setMissing(true);
      return;
    }
    stage.mutate(
      { kind, file, idempotencyKey },
      {
        onSuccess: (staged) =>
          navigate(paths.oneImport(investigationId, staged.id), {
            state: { again: staged.state === "committed" },
          }),
        onError: (error) => {
          // An answer was given to this key; a repaired file or a second try needs a fresh one.
          if (error instanceof ApiError && error.status !== 0) {
            setIdempotencyKey(crypto.randomUUID());
          }
        },
      },
    );
  }

  return (
    <form
      className="max-w-3xl"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        check();
      }}
    >
      <RadioRow
        label="What the file lists"
        name="kind"
        value={kind}
        onChange={(event) => change(() => setKind(event.target.value as Kind))}
        options={[
          { value: "people", label: "People" },
          { value: "pairs", label: "Contact pairs" },
        ]}
        className="mb-4"
      />
      <ColumnHelp kind={kind} />
      <div className="mt-4">
        <FileDrop
          label="CSV file"
          file={file}
          onFile={(chosen) => change(() => setFile(chosen))}
          error={
            missing ? "choose a file first" : tooLarge ? "the file is larger than 50 MB" : undefined
          }
        />
      </div>
      {stage.isError ? <RefusedFile error={stage.error} /> : null}
      <p className="mt-4 flex flex-wrap items-center gap-x-4 gap-y-2">
        <Button
          type="submit"
          variant="primary"
          disabled={tooLarge}
          pending={stage.isPending}
          pendingLabel="Checking every row"
        >
          Check the file
        </Button>
        <span className="text-sm text-ink-2">
          Checking puts nothing on record. You see what would happen first.
        </span>
      </p>
    </form>
  );
}
