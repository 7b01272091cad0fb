import { useId } from "react";
import { useForm } from "react-hook-form";
import { type Member, memberPatch } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import { Button } from "../../../components/ui/button.tsx";
import { Dialog } from "../../../components/ui/dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { contractResolver, fieldWords, showFieldErrors } from "../../../lib/form-errors.ts";
import { type MemberPatch, useChangeMember } from "../api/members.ts";
import { RoleEndField, TeamField } from "./role-fields.tsx";

type Values = { version: number; team: string; endsOn: string };

export type ChangeMemberDialogProps = {
  investigationId: string;
  member: Member;
  onClose: () => void;
};

/** Changes the team and the last day of a membership; its role stays. */
export function ChangeMemberDialog({ investigationId, member, onClose }: ChangeMemberDialogProps) {
  const change = useChangeMember(investigationId);
  const toast = useToast();
  const formId = useId();
  const form = useForm<Values, unknown, MemberPatch>({
    resolver: contractResolver<Values, MemberPatch>(memberPatch),
    defaultValues: {
      version: member.version,
      team: member.team ?? "",
      endsOn: member.endsOn ?? "",
    },
  });
  const { errors, dirtyFields, isDirty } = form.formState;
  return (
    <Dialog
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title={`${member.displayName}, ${ROLE_NAMES[member.role].toLowerCase()}`}
      description="To give another role, add it as a new membership and end this one."
      actions={
        <>
          <Button onClick={onClose}>Keep as it is</Button>
          <Button
            variant="primary"
            type="submit"
            form={formId}
            pending={change.isPending}
            disabled={!isDirty}
          >
            Save the change
          </Button>
        </>
      }
    >
      <form
        id={formId}
        noValidate
        onSubmit={form.handleSubmit(({ version, team, endsOn }) => {
          // Only what was touched: the record of access names it.
          const body = {
            version,
            ...(dirtyFields.team ? { team } : {}),
            ...(dirtyFields.endsOn ? { endsOn } : {}),
          };
          change.mutate(
            { id: member.id, ...body },
            {
              onSuccess: () => {
                toast({ text: `Membership of ${member.displayName} changed`, tone: "done" });
                onClose();
              },
              onError: (error) => {
                showFieldErrors(error, form.setError, (path) => path in body);
              },
            },
          );
        })}
      >
        {change.isError ? (
          <Notice tone="error" title="Not changed." className="mb-3">
            {errorWords(change.error)}.
          </Notice>
        ) : null}
        <div className="grid gap-4">
          <TeamField
            hint="A new name makes a new team. Empty: in no team."
            error={fieldWords(errors.team?.message)}
            {...form.register("team")}
          />
          <RoleEndField error={fieldWords(errors.endsOn?.message)} {...form.register("endsOn")} />
        </div>
      </form>
    </Dialog>
  );
}
