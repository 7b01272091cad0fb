import { type ReactNode, useEffect, useState } from "react";
import { useLocation } from "react-router-dom";
import type { Investigation } from "../../shared/contracts/investigations.ts";
import { hasDuty } from "../../shared/roles.ts";
import { AppFrame } from "../components/layouts/app-frame.tsx";
import { Notice } from "../components/ui/notice.tsx";
import { Tag } from "../components/ui/tag.tsx";
import { AccountMenu } from "../features/session/components/account-menu.tsx";
import { InvestigationSwitch, RoleSwitch } from "../features/session/components/acting-switch.tsx";
import { GeneralCaution } from "../features/session/components/general-caution.tsx";
import { PrivacyCaution } from "../features/session/components/privacy-caution.tsx";
import { type CutOff, CutOffContext } from "../lib/cut-off-context.ts";
import { formatInstant, formatNumber } from "../lib/formatters.ts";
import { isBoolean, useRemembered } from "../lib/remembered.ts";
import { useSession } from "../lib/session-context.ts";
import { useOnline } from "../lib/use-online.ts";
import { paths } from "./paths.ts";
import { homePath, roomLinks } from "./rooms.ts";

export type FrameProps = {
  investigation?: Investigation;
  /** When the settings and the graph version were read (ISO instant). */
  readAt?: string;
  children: ReactNode;
};

/** Header and footer of signed-in pages, with what the session and the investigation say. */
export function Frame({ investigation, readAt, children }: FrameProps) {
  const session = useSession();
  const online = useOnline();
  const { pathname } = useLocation();
  const [roomKeys, setRoomKeys] = useRemembered("room-keys", true, isBoolean);
  const [cutOff, setCutOff] = useState<CutOff | null>(null);

  // biome-ignore lint/correctness/useExhaustiveDependencies: a change of page is what it waits for.
  useEffect(() => {
    window.scrollTo(0, 0);
  }, [pathname]);

  const acting = session.memberships.find((one) => one.investigationId === session.investigationId);
  const invented = investigation?.invented ?? acting?.invented ?? false;
  const practice = investigation?.practice ?? false;
  return (
    <CutOffContext value={setCutOff}>
      <AppFrame
        rooms={roomLinks(session)}
        homeTo={homePath(session)}
        roomKeys={roomKeys}
        investigationSwitch={<InvestigationSwitch session={session} />}
        roleSwitch={<RoleSwitch session={session} />}
        account={
          <AccountMenu
            session={session}
            investigationsTo={paths.investigations}
            passwordTo={paths.password}
            settingsTo={
              session.investigationId ? paths.settings(session.investigationId) : undefined
            }
            membersTo={
              session.investigationId && hasDuty(session.actingRole, "manageMembers")
                ? paths.members(session.investigationId)
                : undefined
            }
            roomKeys={roomKeys}
            onRoomKeysChange={setRoomKeys}
          />
        }
        banner={invented || practice ? <DataMark practice={practice} /> : undefined}
        cutOffLine={
          investigation ? <CutOffLine {...{ investigation, readAt, cutOff }} /> : undefined
        }
        footer={
          <div className="space-y-1.5">
            <GeneralCaution />
            <PrivacyCaution />
          </div>
        }
      >
        {online ? null : (
          <Notice tone="warn" title="No connection." className="mt-3">
            What you type is kept in this tab; saving works again when the signal is back.
          </Notice>
        )}
        {children}
      </AppFrame>
    </CutOffContext>
  );
}

/** Whether what is on the page is real: said in words, on every page. */
function DataMark({ practice }: { practice: boolean }) {
  if (practice) {
    return (
      <>
        <Tag tone="ochre">practice</Tag> To practise with: all is invented, may be emptied, sends
        nothing and counts nowhere.
      </>
    );
  }
  return "Invented data: no person, place or illness here is real.";
}

function CutOffLine(props: {
  investigation: Investigation;
  readAt: string | undefined;
  cutOff: CutOff | null;
}) {
  const { investigation, readAt, cutOff } = props;
  const version = cutOff?.graphVersion ?? investigation.graphVersion;
  const at = cutOff?.cutOff ?? readAt;
  const updating = cutOff?.updating || version < investigation.graphVersion;
  return (
    <>
      {investigation.name} · cut-off {formatInstant(at, investigation.timeZone)} · version{" "}
      {formatNumber(version)}
      {updating ? ", updating" : ""}
    </>
  );
}
