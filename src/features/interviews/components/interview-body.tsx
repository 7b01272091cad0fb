import { type KeyboardEvent, type RefObject, useRef } from "react";
import { paths } from "../../../app/paths.ts";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { Caution } from "../../../components/ui/caution.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import type { DraftKeeper, DraftState } from "../draft/draft-keeper.ts";
import type { DraftBody } from "../form/draft-body.ts";
import type { InterviewValues } from "../form/interview-values.ts";
import { ContactRows } from "./contact-rows.tsx";
import { DraftConflict } from "./draft-conflict.tsx";
import { DraftLine } from "./draft-line.tsx";
import { DraftWatch } from "./draft-watch.tsx";
import { useFormSurroundings } from "./form-context.ts";
import { GroupRows } from "./group-rows.tsx";
import { InterviewStrip } from "./interview-strip.tsx";
import { OutcomeSection, outcomeBoxId } from "./outcome-section.tsx";
import { useInterviewForm } from "./use-exposure-boxes.ts";
import { useIsWide } from "./use-is-wide.ts";
import { useSubmitInterview } from "./use-submit-interview.ts";
import { WindowWords } from "./window-words.tsx";

export type InterviewBodyProps = {
  keeper: DraftKeeper;
  state: DraftState;
  submitKey: RefObject<string>;
  /** What the form holds at this moment. */
  bodyNow: () => DraftBody;
  onChange: (values: InterviewValues) => void;
  /** Puts another version into the boxes. */
  onTakeOver: (body: DraftBody) => void;
};

/** Windows, contacts, groups, outcome, and the foot with what is saved and the button to record. */
export function InterviewBody(props: InterviewBodyProps) {
  const { keeper, state, bodyNow } = props;
  const { investigationId, person } = useFormSurroundings();
  const { timeZone: zone } = useInvestigation();
  const form = useInterviewForm();
  const wide = useIsWide();
  const contacts = useRef<HTMLDivElement>(null);
  const { submit, sending, done, problem, setProblem } = useSubmitInterview({
    investigationId,
    personId: person.id,
    keeper,
    submitKey: props.submitKey,
  });

  function onKeyDown(event: KeyboardEvent<HTMLFormElement>) {
    if (event.key !== "Enter" || event.defaultPrevented) return;
    if (event.ctrlKey || event.metaKey) {
      event.preventDefault();
      contacts.current?.querySelector<HTMLButtonElement>("[data-add-contact]")?.click();
    } else if ((event.target as Element).tagName !== "BUTTON") {
      // Only the button records: Enter in a box must not send a half-told interview.
      event.preventDefault();
    }
  }

  function nobodyReached() {
    form.setValue("outcome", "attempted", { shouldDirty: true });
    document.getElementById(outcomeBoxId)?.focus();
  }

  const strip = (
    <Section
      title="Days"
      subLine="contacts appear here on their days of exposure as they are typed"
    >
      <InterviewStrip />
    </Section>
  );

  return (
    <form
      noValidate
      aria-label={`Interview of ${person.studyNumber}`}
      onKeyDown={onKeyDown}
      onBlur={() => keeper.flush()}
      onSubmit={(event) => {
        void form.handleSubmit(submit, () => {
          setProblem("Not recorded: some boxes need another look.");
        })(event);
      }}
    >
      <DraftWatch onChange={props.onChange} />
      <div className="mb-4 flex flex-wrap items-start justify-between gap-x-8 gap-y-3 lg:flex-nowrap">
        <div className="min-w-0 space-y-2">
          <WindowWords person={person} />
          <Caution>
            Do not tell a contact who the case is. Open only the records you need; views are logged.
          </Caution>
        </div>
        <Button onClick={nobodyReached} title="Sets the outcome to attempted" className="shrink-0">
          Nobody reached
        </Button>
      </div>
      {wide ? (
        // Of one height from the start, so that no row moves while it is typed.
        <div className="h-60 overflow-y-auto border-b border-rule [@media(min-height:56rem)]:h-80">
          {strip}
        </div>
      ) : null}
      <div ref={contacts} className="pt-3">
        <ContactRows onStep={() => keeper.flush()} autoFocus={wide} />
      </div>
      {wide ? null : strip}
      <GroupRows onStep={() => keeper.flush()} />
      <OutcomeSection />
      {problem ? (
        <Notice tone="error" className="mb-3">
          {problem}
        </Notice>
      ) : null}
      <div
        className="sticky bottom-0 z-20 -mx-4 flex flex-wrap items-center gap-x-4 gap-y-2 border-t
          border-rule bg-paper px-4 py-2 sm:-mx-6 sm:px-6"
      >
        {state.kind === "conflict" ? (
          <div className="w-full">
            <DraftConflict
              state={state}
              zone={zone}
              mine={bodyNow()}
              onKeepMine={() => keeper.keepMine(bodyNow())}
              onTakeTheirs={(theirs) => {
                props.onTakeOver(theirs);
                keeper.takeTheirs();
              }}
            />
          </div>
        ) : null}
        <Button type="submit" variant="primary" pending={sending || done} pendingLabel="Recording">
          Record the interview
        </Button>
        <LinkButton
          to={paths.person(investigationId, person.id)}
          variant="plain"
          className="hidden! px-1! sm:inline-flex!"
        >
          Leave, keep the draft
        </LinkButton>
        <div className="ms-auto">
          <DraftLine state={state} zone={zone} />
        </div>
      </div>
    </form>
  );
}
