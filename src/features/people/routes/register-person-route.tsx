import { Fragment, useEffect, useState } from "react";
import { useForm } from "react-hook-form";
import { useNavigate } from "react-router-dom";
import { type PersonInput, personInput } from "../../../../shared/contracts/people.ts";
import { isCase } from "../../../../shared/vocabulary.ts";
import { paths } from "../../../app/paths.ts";
import { RoomPage } from "../../../components/layouts/room-page.tsx";
import { Section } from "../../../components/layouts/section.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { KeyboardHint } from "../../../components/ui/keyboard-hint.tsx";
import { LinkButton } from "../../../components/ui/link-button.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { UnsavedGuard } from "../../../components/ui/unsaved-guard.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { contractResolver, showFieldErrors } from "../../../lib/form-errors.ts";
import { useInvestigation } from "../../../lib/investigation-context.ts";
import { useRegisterPerson } from "../api/register-person.ts";
import { AlreadyOnRecord } from "../components/already-on-record.tsx";
import { DateKeys } from "../components/date-keys.tsx";
import { PersonFieldInput } from "../components/person-field-input.tsx";
import { blankPerson, fieldsIn, type PersonSection, type PersonValues } from "../person-fields.ts";

const sections: readonly { id: PersonSection; title: string; subLine: string }[] = [
  { id: "who", title: "Who", subLine: "Kept encrypted, apart from everything below." },
  { id: "illness", title: "What is known about the illness", subLine: "Blank means: not asked." },
  { id: "test", title: "First test", subLine: "Further tests go on the person’s page." },
];

/** Registers a person: a case, or someone who may have met one. */
export function Component() {
  const { id, today } = useInvestigation();
  const navigate = useNavigate();
  const toast = useToast();
  // One key for this form: pressing twice, or trying again without a signal, makes one person.
  const [idempotencyKey] = useState(() => crypto.randomUUID());
  const register = useRegisterPerson(id, idempotencyKey);
  const form = useForm<PersonValues, unknown, PersonInput>({
    resolver: contractResolver<PersonValues, PersonInput>(personInput),
    defaultValues: { ...blankPerson(), reportDate: today },
  });
  const { isDirty } = form.formState;

  const save = form.handleSubmit((body) => {
    register.mutate(body, {
      onError: (error) => {
        showFieldErrors(error, form.setError, (path) => path in body);
      },
    });
  });

  // After the render in which nothing is unsaved any more, or the guard would hold the page back.
  const { data: made, variables } = register;
  useEffect(() => {
    if (!made) return;
    toast({ tone: "done", text: `Registered as ${made.studyNumber}.` });
    const toInterview = isCase(variables?.classification ?? null);
    void navigate(toInterview ? paths.interview(id, made.id) : paths.person(id, made.id));
  }, [made, variables, id, navigate, toast]);

  return (
    <RoomPage
      title="Register a person"
      subLine="Whatever is known now; the rest can follow."
      sideLabel="Typing dates"
      side={
        <Section title="Typing dates" level={3}>
          <DateKeys />
        </Section>
      }
    >
      <UnsavedGuard unsaved={isDirty && !register.isSuccess} />
      <form
        noValidate
        className="max-w-3xl"
        onSubmit={(event) => void save(event)}
        onKeyDown={(event) => {
          if (event.key === "Enter" && (event.ctrlKey || event.metaKey)) void save();
        }}
      >
        {register.isError ? (
          <Notice tone="error" title="Not saved." className="mb-4">
            {register.error instanceof ApiError && register.error.code === "key_reused"
              ? "An earlier try was saved after all. Look for it in the line list and change it there."
              : `${errorWords(register.error)}. What you typed is still here; saving again makes no second person.`}
          </Notice>
        ) : null}
        {sections.map(({ id: section, title, subLine }) => (
          <Section key={section} title={title} subLine={subLine}>
            <div className="grid gap-x-6 gap-y-3 sm:grid-cols-2">
              {fieldsIn(section).map((field) => (
                <Fragment key={field.key}>
                  <PersonFieldInput {...{ field, form, today }} />
                  {field.key === "phone" ? (
                    <AlreadyOnRecord investigationId={id} control={form.control} />
                  ) : null}
                </Fragment>
              ))}
            </div>
          </Section>
        ))}
        <div className="flex flex-wrap items-center gap-2">
          <Button
            variant="primary"
            type="submit"
            pending={register.isPending}
            pendingLabel="Saving"
          >
            Register
          </Button>
          <LinkButton to={paths.trace(id)}>Not now</LinkButton>
          <KeyboardHint keys={["Ctrl", "Enter"]}>saves</KeyboardHint>
        </div>
      </form>
    </RoomPage>
  );
}
