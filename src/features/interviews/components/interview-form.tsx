import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import { FormProvider, useForm } from "react-hook-form";
import type { Draft } from "../../../../shared/contracts/interviews.ts";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { formatInstant } from "../../../lib/formatters.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useDraftKeeper } from "../draft/use-draft-keeper.ts";
import { type DraftBody, freshDraft, holdsSomething, readDraft } from "../form/draft-body.ts";
import { wallTime } from "../form/held-at.ts";
import { type CheckedInterview, interviewResolver } from "../form/interview-resolver.ts";
import type { InterviewValues } from "../form/interview-values.ts";
import { FormSurroundingsContext } from "./form-context.ts";
import { InterviewBody } from "./interview-body.tsx";
import { PlaceLists } from "./place-lists.tsx";
import type { LivePlaceBook } from "./use-places.ts";

export type InterviewFormProps = { person: PersonPage; draft: Draft; places: LivePlaceBook };

/** The form of one interview: opened from its draft, kept saved, and sent once. */
export function InterviewForm({ person, draft, places }: InterviewFormProps) {
  const { id: investigationId, timeZone: zone, today } = useInvestigation();
  const [opened] = useState(() => {
    const restored = readDraft(draft.body);
    const start = restored ?? freshDraft(wallTime(Date.now(), zone));
    if (start.form.heldAt === "") start.form.heldAt = wallTime(Date.now(), zone);
    return { start, restored: restored !== null && holdsSomething(restored.form) };
  });
  const [anew, setAnew] = useState(false);
  const toast = useToast();
  const submitKey = useRef(opened.start.submitKey);
  const sendContext = useRef({
    personId: person.id,
    zone,
    today,
    placeIdOf: (place: string, setting: string) => places.find(place, setting)?.id,
  });
  useEffect(() => {
    sendContext.current = {
      personId: person.id,
      zone,
      today,
      placeIdOf: (place, setting) => places.find(place, setting)?.id,
    };
  }, [person.id, zone, today, places]);

  const [resolver] = useState(() => interviewResolver(() => sendContext.current));
  const form = useForm<InterviewValues, unknown, CheckedInterview>({
    defaultValues: opened.start.form,
    resolver,
  });
  const [keeper, state] = useDraftKeeper(investigationId, person.id, draft);
  const bodyNow = useCallback(
    (): DraftBody => ({ form: form.getValues(), submitKey: submitKey.current }),
    [form],
  );
  const onChange = useCallback(
    (values: InterviewValues) => keeper.change({ form: values, submitKey: submitKey.current }),
    [keeper],
  );
  const surroundings = useMemo(
    () => ({ investigationId, person, today, places }),
    [investigationId, person, today, places],
  );

  function takeOver(body: DraftBody) {
    submitKey.current = body.submitKey;
    form.reset(body.form);
  }

  function beginAnew() {
    const before = structuredClone(bodyNow());
    takeOver(freshDraft(wallTime(Date.now(), zone)));
    setAnew(true);
    toast({
      text: "The draft was emptied",
      action: { label: "Put it back", run: () => takeOver(before) },
    });
  }

  return (
    <FormSurroundingsContext value={surroundings}>
      <FormProvider {...form}>
        {opened.restored && !anew ? (
          <Notice
            title="Taken up again."
            className="mb-4"
            actions={
              <Button size="small" onClick={beginAnew}>
                Begin anew
              </Button>
            }
          >
            What you typed until {formatInstant(draft.updatedAt, zone)} is back in its boxes.
          </Notice>
        ) : null}
        <PlaceLists places={places} />
        <InterviewBody
          keeper={keeper}
          state={state}
          submitKey={submitKey}
          bodyNow={bodyNow}
          onChange={onChange}
          onTakeOver={takeOver}
        />
        <UnsavedGuard
          unsaved={state.kind === "failed" || state.kind === "conflict"}
          description="The last words typed here have not reached the server. Leaving drops them."
        />
      </FormProvider>
    </FormSurroundingsContext>
  );
}
