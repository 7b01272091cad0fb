import type { Member } from "../../../../shared/contracts/investigations.ts";
import { ROLE_NAMES } from "../../../../shared/roles.ts";
import { ConfirmDialog } from "../../../components/ui/confirm-dialog.tsx";
import { Notice } from "../../../components/ui/notice.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { ApiError, errorWords } from "../../../lib/api-error.ts";
import { fieldWords } from "../../../lib/form-errors.ts";
import { useEndMember } from "../api/members.ts";

export type EndMemberDialogProps = {
  investigationId: string;
  member: Member;
  /** The membership is the reader's own. */
  own: boolean;
  onClose: () => void;
};

/** Asks before a membership ends, and says what that takes away. */
export function EndMemberDialog({ investigationId, member, own, onClose }: EndMemberDialogProps) {
  const end = useEndMember(investigationId, own);
  const toast = useToast();
  const role = ROLE_NAMES[member.role].toLowerCase();
  const why = end.error instanceof ApiError ? end.error.errors[0]?.code : undefined;
  return (
    <ConfirmDialog
      open
      onOpenChange={(open) => {
        if (!open) onClose();
      }}
      title={own ? "End your own role here?" : `End ${member.displayName}’s role here?`}
      description={
        own
          ? `You stop being ${role} of this investigation at once, and this room closes to you. What you recorded stays.`
          : `${member.displayName} stops being ${role} of this investigation at their next step. What they recorded stays, and their name stays in the access record. They can be added again.`
      }
      confirmLabel="End the membership"
      danger
      pending={end.isPending}
      onConfirm={() => {
        end.mutate(member.id, {
          onSuccess: () => {
            toast({ text: `Membership of ${member.displayName} ended`, tone: "done" });
            onClose();
          },
        });
      }}
    >
      {end.isError ? (
        <Notice tone="error" title="Not ended.">
          {fieldWords(why) ?? errorWords(end.error)}.
        </Notice>
      ) : null}
    </ConfirmDialog>
  );
}
