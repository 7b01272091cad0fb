import { useState } from "react";
import { useNavigate } from "react-router-dom";
import type { CompareRun, CompareRunInput } from "../../../../shared/contracts/compare.ts";
import { paths } from "../../../app/paths.ts";
import { Button } from "../../../components/ui/button.tsx";
import { buttonClass } from "../../../components/ui/button-class.ts";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { inInvestigation } from "../../../lib/api-client.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { useAskCompareRun, useRunAgain } from "../api/ask-compare-run.ts";
import { useEndCompareRun } from "../api/end-compare-run.ts";
import { mayChange } from "../run-words.ts";

export type RunActionsProps = { investigationId: string; run: CompareRun };

/** What can be done with a run that has ended: take it out, work it out again, delete it. */
export function RunActions({ investigationId, run }: RunActionsProps) {
  const navigate = useNavigate();
  const [keys, renewKeys] = useState(newKeys);
  const [deleting, setDeleting] = useState(false);
  const again = useRunAgain(investigationId);
  const ask = useAskCompareRun(investigationId);
  const end = useEndCompareRun(investigationId);
  const error = again.error ?? ask.error ?? end.error;
  const open = (id: string, search = "") =>
    void navigate(`${paths.compareRun(investigationId, id)}${search}`);
  const onError = () => renewKeys(newKeys());
  return (
    <div className="mb-4" data-print="hide">
      <div className="flex flex-wrap gap-2">
        {run.state === "ready" ? (
          <a
            href={inInvestigation(investigationId, `compare/runs/${run.id}/file`)}
            download=""
            className={buttonClass("primary", "normal")}
          >
            Download the run
          </a>
        ) : null}
        <Button
          pending={again.isPending}
          onClick={() =>
            again.mutate(
              { runId: run.id, idempotencyKey: keys.again },
              {
                onSuccess: ({ id }) => {
                  renewKeys(newKeys());
                  open(id);
                },
                onError,
              },
            )
          }
        >
          Run again
        </Button>
        {run.state === "ready" ? (
          <Button
            pending={ask.isPending}
            onClick={() =>
              ask.mutate(
                { body: askedNow(run), idempotencyKey: keys.now },
                {
                  onSuccess: ({ id }) => {
                    renewKeys(newKeys());
                    open(id, `?with=${run.id}`);
                  },
                  onError,
                },
              )
            }
          >
            Ask the record as it stands now
          </Button>
        ) : null}
        {mayChange(run) ? (
          <Button variant="danger" onClick={() => setDeleting(true)}>
            Delete
          </Button>
        ) : null}
      </div>
      <p className="mt-1.5 max-w-[80ch] text-sm text-ink-2">
        Run again takes the same record, cut-off and seed and gives the same figures. The record as
        it stands now gives a comparison of its own, side by side with this one.
      </p>
      {error ? (
        <Notice tone="error" title="Not done." className="mt-2">
          {errorWords(error)}.
        </Notice>
      ) : null}
      <ConfirmDialog
        open={deleting}
        onOpenChange={setDeleting}
        title="Delete this comparison?"
        description="It is taken off the list for everybody. The record that it was worked out from stays."
        confirmLabel="Delete the comparison"
        danger
        pending={end.isPending}
        onConfirm={() =>
          end.mutate(
            { runId: run.id, act: "delete" },
            {
              onSuccess: () => void navigate(paths.compare(investigationId)),
              onSettled: () => setDeleting(false),
            },
          )
        }
      />
    </div>
  );
}

const newKeys = () => ({ again: crypto.randomUUID(), now: crypto.randomUUID() });

/** The same question with no day of its own; a preset window moves along with the record. */
function askedNow(run: CompareRun): CompareRunInput {
  const { name, population, window, from, to, attribute, seed } = run;
  return {
    name,
    population,
    ...(window === "free" ? { ...(from ? { from } : {}), ...(to ? { to } : {}) } : { window }),
    attribute,
    replicates: run.replicates as CompareRunInput["replicates"],
    seed,
  };
}
