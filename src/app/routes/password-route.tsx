import { useNavigate } from "react-router-dom";
import { RoomPage } from "../../components/layouts/room-page.tsx";
import { useToast } from "../../components/ui/use-toast.ts";
import { ChangePasswordForm } from "../../features/session/components/change-password-form.tsx";
import { useSession } from "../../lib/session-context.ts";
import { Frame } from "../frame.tsx";
import { homePath } from "../rooms.ts";

/** Changing one's own password. */
export function Component() {
  const session = useSession();
  const navigate = useNavigate();
  const toast = useToast();
  return (
    <Frame>
      <RoomPage title="Change password" subLine="Your other sessions end; this one goes on.">
        <ChangePasswordForm
          email={session.email}
          onDone={(next) => {
            toast({ tone: "done", text: "Password changed. Your other sessions have ended." });
            void navigate(homePath(next));
          }}
        />
      </RoomPage>
    </Frame>
  );
}
