import { useNavigate } from "react-router-dom";
import type { Session } from "../../../../shared/contracts/session.ts";
import { ROLE_NAMES, type Role } from "../../../../shared/roles.ts";
import { MenuSelect } from "../../../components/ui/menu-select.tsx";

/** Asks for another acting role or investigation by going to the page that makes the switch. */
export function useSwitchActing() {
  const navigate = useNavigate();
  return (actingRole: Role, investigationId: string) => {
    // Not in the address: a link from elsewhere must not switch anything.
    void navigate("/acting", { state: { actingRole, investigationId } });
  };
}

/** The role one acts in: a choice when several are held here, plain words otherwise. */
export function RoleSwitch({ session }: { session: Session }) {
  const switchTo = useSwitchActing();
  const { actingRole, investigationId } = session;
  if (!actingRole || !investigationId) return null;
  const roles = session.memberships
    .filter((one) => one.investigationId === investigationId)
    .map((one) => one.role);
  if (roles.length < 2) {
    return <span className="whitespace-nowrap text-ink-2">{ROLE_NAMES[actingRole]}</span>;
  }
  return (
    <MenuSelect<Role>
      label="acting as"
      size="small"
      options={roles.map((role) => ({ value: role, label: ROLE_NAMES[role] }))}
      value={actingRole}
      onValueChange={(role) => switchTo(role, investigationId)}
    />
  );
}

/** The investigation one acts in. Going to another keeps the role where it is held there too. */
export function InvestigationSwitch({ session }: { session: Session }) {
  const switchTo = useSwitchActing();
  const { actingRole, investigationId } = session;
  const names = new Map(
    session.memberships.map((one) => [one.investigationId, one.investigationName]),
  );
  const current = investigationId ? names.get(investigationId) : undefined;
  if (!investigationId || !current) return null;
  if (names.size < 2) return <span className="truncate">{current}</span>;
  return (
    <MenuSelect
      label="Investigation"
      hideLabel
      size="small"
      options={[...names].map(([value, label]) => ({ value, label }))}
      value={investigationId}
      onValueChange={(next) => {
        const there = session.memberships.filter((one) => one.investigationId === next);
        const role = there.find((one) => one.role === actingRole) ?? there[0];
        if (role) switchTo(role.role, next);
      }}
    />
  );
}
