import { useState } from "react";
import { useNavigate } from "react-router-dom";
import { LIMITS } from "../../../../shared/contracts/common.ts";
import type { HeadingsAnswer } from "../../../../shared/contracts/imports.ts";
import { paths } from "../../../app/paths.ts";
import { RadioRow } from "../../../components/fields/radio-row.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { ApiError } from "../../../lib/api-error.ts";
import { useReadHeadings } from "../api/read-headings.ts";
import { useStageImport } from "../api/stage-import.ts";
import { type Mapping, mappingErrors, suggestedMapping } from "../import-words.ts";
import { ColumnHelp } from "./column-help.tsx";
import { ColumnMapping } from "./column-mapping.tsx";
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
  const headings = useReadHeadings(investigationId);
  // What the headings suggest until somebody chooses otherwise.
  const [chosen, setChosen] = useState<Mapping | null>(null);
  const [faulty, setFaulty] = useState(false);
  // Not the request's own data: it must be gone in the moment in which another file is taken.
  const [found, setFound] = useState<HeadingsAnswer | null>(null);
  const mapping = chosen ?? (found ? suggestedMapping(found) : null);
  const errors = mapping ? mappingErrors(kind, mapping) : null;
  const tooLarge = file !== null && file.size > LIMITS.fileBytes;

  function renew() {
    setMissing(false);
    setFaulty(false);
    stage.reset();
    // Another file, kind or choice of columns is another request.
    setIdempotencyKey(crypto.randomUUID());
  }

  /** A file and what it lists: its first line is read at once. */
  function take(nextKind: Kind, nextFile: File | null) {
    setKind(nextKind);
    setFile(nextFile);
    setChosen(null);
    setFound(null);
    renew();
    if (nextFile && nextFile.size <= LIMITS.fileBytes) {
      headings.mutate({ kind: nextKind, file: nextFile }, { onSuccess: setFound });
    } else headings.reset();
  }

  function check() {
    if (!file) {
      setMissing(true);
      return;
    }
    if (!mapping || !errors) return;
    if (errors.twice.size + errors.missing.length > 0) {
      setFaulty(true);
      return;
    }
    stage.mutate(
      { kind, file, columns: mapping, idempotencyKey },
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
        onChange={(event) => take(event.target.value as Kind, file)}
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
          onFile={(chosen) => take(kind, chosen)}
          error={
            missing ? "choose a file first" : tooLarge ? "the file is larger than 50 MB" : undefined
          }
        />
      </div>
      {headings.isPending ? (
        <p role="status" className="mt-4 text-ink-2">
          Reading the first line
        </p>
      ) : null}
      {headings.isError ? <RefusedFile error={headings.error} /> : null}
      {found && mapping ? (
        <ColumnMapping
          kind={kind}
          found={found}
          mapping={mapping}
          onChange={(next) => {
            setChosen(next);
            renew();
          }}
        />
      ) : null}
      {faulty && errors ? (
        <Notice tone="error" title="Not checked yet." className="mt-4">
          {errors.missing.length > 0
            ? `No column is taken for ${errors.missing.join(" and ")}; every row needs one.`
            : "Two columns are taken for the same one."}
        </Notice>
      ) : null}
      {stage.isError ? <RefusedFile error={stage.error} /> : null}
      <p className="mt-4 flex flex-wrap items-center gap-x-4 gap-y-2">
        <Button
          type="submit"
          variant="primary"
          disabled={file !== null && !found}
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
