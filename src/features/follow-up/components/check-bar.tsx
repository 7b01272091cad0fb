import { lazy, Suspense, useState } from "react";
import { CHECK_OUTCOMES, type CheckOutcome } from "../../../../shared/vocabulary.ts";
import { Button } from "../../../components/ui/button.tsx";
import { LoadingState } from "../../../components/ui/loading-state.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/form-errors.ts";
import { checkWords } from "../../../lib/words.ts";
import { useRecordCheck } from "../api/record-check.ts";
import { useWithdrawCheck } from "../api/withdraw-check.ts";
import { type CheckDetails, checkBody, noDetails } from "../lib/check-details.ts";
import { EndFollowUp } from "./end-follow-up.tsx";
import { MakeCase } from "./make-case.tsx";

// Most checks are one press; what is asked beside it comes when it is wanted.
const DetailsForm = lazy(() =>
  import("./check-details-form.tsx").then((file) => ({ default: file.CheckDetailsForm })),
);

export type CheckedPerson = {
  id: string;
  version: number;
  /** Name where it is the reader's to know, else the study number. */
  called: string;
  /** True when the reader may change the record. */
  mine: boolean;
};

export type CheckBarProps = { investigationId: string; person: CheckedPerson; today: string };

function refusal(error: unknown): string {
  const field = error instanceof ApiError ? error.errors[0] : undefined;
  return field ? (fieldWords(field.code) ?? errorWords(error)) : errorWords(error);
}

/** One press records how a contact was reached; with the details open, these go with it. */
export function CheckBar({ investigationId, person, today }: CheckBarProps) {
  const [details, setDetails] = useState<CheckDetails | null>(null);
  const record = useRecordCheck(investigationId, person.id);
  const withdraw = useWithdrawCheck(investigationId, person.id);
  const toast = useToast();

  function takeBack(checkId: string) {
    withdraw.mutate(checkId, {
      onSuccess: () => toast({ text: `${person.called}: the check is taken back`, tone: "info" }),
      onError: (error) => toast({ text: `Not taken back: ${errorWords(error)}`, tone: "error" }),
    });
  }

  function press(outcome: CheckOutcome) {
    record.mutate(checkBody(outcome, details, today), {
      onSuccess({ id }) {
        setDetails(null);
        toast({
          text: `${person.called}: ${checkWords[outcome]}`,
          tone: "done",
          action: { label: "Take back", run: () => takeBack(id) },
        });
      },
    });
  }

  return (
    <div className={details || record.isError ? "min-w-0 basis-full" : "min-w-0 max-sm:basis-full"}>
      {details ? (
        <Suspense fallback={<LoadingState label="Opening the form" rows={2} />}>
          <DetailsForm
            investigationId={investigationId}
            called={person.called}
            name={`check-${person.id}`}
            value={details}
            today={today}
            onChange={setDetails}
          />
        </Suspense>
      ) : null}
      <fieldset className="grid grid-cols-2 items-center gap-1.5 sm:flex sm:flex-wrap">
        <legend className="sr-only">Check of {person.called}</legend>
        {CHECK_OUTCOMES.map((outcome) => (
          <Button
            key={outcome}
            size="small"
            pending={record.isPending && record.variables.outcome === outcome}
            onClick={() => (record.isPending ? undefined : press(outcome))}
          >
            {checkWords[outcome]}
          </Button>
        ))}
        <Button
          size="small"
          variant="plain"
          aria-expanded={details !== null}
          onClick={() => setDetails(details ? null : noDetails(today))}
        >
          {details ? "without details" : "symptoms, note"}
        </Button>
        {person.mine ? <MakeCase investigationId={investigationId} person={person} /> : null}
        <EndFollowUp investigationId={investigationId} person={person} today={today} />
      </fieldset>
      {record.isError ? (
        <Notice tone="error" title="Not recorded." className="mt-2">
          {refusal(record.error)}. Press again to try again.
        </Notice>
      ) : null}
    </div>
  );
}
