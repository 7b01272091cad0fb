import { useState } from "react";
import { Link } from "react-router-dom";
import type { Session } from "../../../../shared/contracts/session.ts";
import { ThemeSwitch } from "../../../components/layouts/theme-switch.tsx";
import { Button } from "../../../components/ui/button.tsx";
import { DropPanel } from "../../../components/ui/drop-panel.tsx";
import { useToast } from "../../../components/ui/use-toast.ts";
import { errorWords } from "../../../lib/api-error.ts";
import { signOut } from "../api/sign-out.ts";

export type AccountMenuProps = {
  session: Session;
  investigationsTo: string;
  passwordTo: string;
  /** The settings of the acting investigation; undefined while one acts in none. */
  settingsTo: string | undefined;
  /** Where members are added; undefined for a role that may not. */
  membersTo: string | undefined;
  roomKeys: boolean;
  onRoomKeysChange: (on: boolean) => void;
};

/** Name, looks, other investigations, sign-out: behind one button in the header. */
export function AccountMenu({
  session,
  investigationsTo,
  passwordTo,
  settingsTo,
  membersTo,
  roomKeys,
  onRoomKeysChange,
}: AccountMenuProps) {
  const [leaving, setLeaving] = useState(false);
  const toast = useToast();
  const links = [
    ...(membersTo ? ([[membersTo, "Members and invitations"]] as const) : []),
    ...(settingsTo ? ([[settingsTo, "Settings of the investigation"]] as const) : []),
    [investigationsTo, "Investigations"] as const,
    [passwordTo, "Change password"] as const,
  ];

  async function leave() {
    setLeaving(true);
    try {
      await signOut();
    } catch (error) {
      setLeaving(false);
      toast({ tone: "error", text: `Still signed in. ${errorWords(error)}.` });
    }
  }

  return (
    <DropPanel
      label={<span className="truncate">{session.displayName}</span>}
      panelLabel="Account"
      className="w-72"
    >
      {(close) => (
        <>
          <p className="font-bold">{session.displayName}</p>
          <p className="mb-3 break-all text-ink-2">{session.email}</p>
          <ThemeSwitch />
          <label className="mt-2 flex min-h-8 items-center gap-2">
            <input
              type="checkbox"
              checked={roomKeys}
              onChange={(event) => onRoomKeysChange(event.target.checked)}
            />
            Alt with a digit opens a room
          </label>
          <ul className="mt-2 space-y-1 border-t border-rule pt-2">
            {links.map(([to, words]) => (
              <li key={to}>
                <Link to={to} onClick={close} className="text-kelp underline underline-offset-4">
                  {words}
                </Link>
              </li>
            ))}
          </ul>
          <div className="mt-3 mb-1">
            <Button size="small" pending={leaving} onClick={() => void leave()}>
              Sign out
            </Button>
          </div>
        </>
      )}
    </DropPanel>
  );
}
