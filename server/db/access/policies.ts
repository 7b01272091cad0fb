import type { Role } from "../../../shared/roles.ts";
import { ROLES } from "../../../shared/roles.ts";

/** The database login of an application role. */
export function loginOf(role: Role | "auth" | "system"): string {
  return `strandline_${role}`;
}

/** Which roles may add or change rows of a table, and which columns a change may touch. */
interface Writes {
  insert: readonly Role[];
  update?: { roles: readonly Role[]; columns: readonly string[] };
  /** Only for what is no record of the investigation; everything else is withdrawn, not deleted. */
  remove?: readonly Role[];
}

const RECORDERS = ["tracer", "supervisor", "officer"] as const;
const LEADERS = ["supervisor", "officer"] as const;
const COMPARERS = ["supervisor", "epidemiologist"] as const;
const EXPORTERS = ["supervisor", "epidemiologist", "officer"] as const;

export const WRITES: Record<string, Writes> = {
  "core.person": {
    insert: RECORDERS,
    update: {
      roles: RECORDERS,
      columns: [
        "sex",
        "age_band",
        "area",
        "occupation",
        "household_id",
        "classification",
        "case_definition_version",
        "onset_date",
        "specimen_date",
        "result_date",
        "result",
        "report_date",
        "interview_date",
        "interviewed",
        "interview_state",
        "isolation_date",
        "outcome",
        "outcome_date",
        "became_case",
        "assigned_account_id",
        "assigned_team_id",
        "version",
        "updated_at",
        "withdrawn_at",
      ],
    },
  },
  "core.classification": { insert: RECORDERS },
  "core.test_result": {
    insert: RECORDERS,
    update: {
      roles: RECORDERS,
      columns: [
        "specimen_date",
        "kind",
        "result",
        "result_date",
        "result_at",
        "version",
        "withdrawn_at",
      ],
    },
  },
  "core.interview": {
    insert: RECORDERS,
    update: { roles: RECORDERS, columns: ["graph_version", "withdrawn_at"] },
  },
  "core.contact_pair": {
    insert: RECORDERS,
    update: { roles: RECORDERS, columns: ["withdrawn_at"] },
  },
  "core.exposure": { insert: RECORDERS, update: { roles: RECORDERS, columns: ["withdrawn_at"] } },
  "core.group_exposure": {
    insert: ["tracer", "supervisor"],
    update: { roles: ["tracer", "supervisor"], columns: ["withdrawn_at"] },
  },
  "core.follow_check": {
    insert: ["tracer", "supervisor"],
    update: { roles: ["tracer", "supervisor"], columns: ["withdrawn_at"] },
  },
  "core.follow_end": {
    insert: ["tracer", "supervisor"],
    update: { roles: ["tracer", "supervisor"], columns: ["withdrawn_at", "withdrawn_by"] },
  },
  "core.place": {
    insert: RECORDERS,
    update: { roles: RECORDERS, columns: ["name", "setting", "area", "version"] },
  },
  "core.team": {
    insert: LEADERS,
    update: { roles: LEADERS, columns: ["name", "version", "removed_at"] },
  },
  "core.member": {
    insert: LEADERS,
    update: { roles: LEADERS, columns: ["ends_on", "ended_at", "team_id", "version"] },
  },
  "core.graph_change": { insert: RECORDERS },
  "core.import": {
    insert: LEADERS,
    update: {
      roles: LEADERS,
      columns: [
        "state",
        "row_count",
        "counts",
        "problems",
        "progress",
        "create_missing",
        "committed_at",
      ],
    },
  },
  "core.export": {
    insert: EXPORTERS,
    update: {
      roles: EXPORTERS,
      columns: [
        "state",
        "progress",
        "failure",
        "row_count",
        "bytes",
        "parts",
        "sha256",
        "downloads",
        "finished_at",
        "expires_at",
      ],
    },
  },
  "core.compare_run": {
    insert: COMPARERS,
    update: { roles: COMPARERS, columns: ["name", "state", "finished_at"] },
    remove: COMPARERS,
  },
  "core.match_review": { insert: [], update: { roles: ["supervisor"], columns: ["state"] } },
  "core.investigation": {
    insert: [],
    update: {
      roles: LEADERS,
      columns: [
        "name",
        "invented",
        "time_zone",
        "country_code",
        "population_at_risk",
        "infectious_before",
        "infectious_after",
        "incubation_min",
        "incubation_max",
        "monitoring_days",
        "lost_after_days",
        "cluster_window_days",
        "cluster_minimum_cases",
        "closure_days",
        "small_cell_threshold",
        "exposure_grading",
        "symptoms",
        "texts",
        "case_definition_version",
        "version",
      ],
    },
  },
  "core.case_definition": { insert: LEADERS },
  "core.setting_change": { insert: LEADERS },
  "core.saved_filter": {
    insert: ROLES,
    update: { roles: ROLES, columns: ["name", "filter", "version", "updated_at"] },
    remove: ROLES,
  },
};

const SCOPE = "any ((select core.ctx_people())::uuid[])";
const HERE = "investigation_id = (select core.ctx_investigation())";

/** Rows a tracer sees, where that is less than the whole investigation. */
const TRACER_ROWS: Record<string, string> = {
  "core.person": `${HERE} and id = ${SCOPE}`,
  "core.classification": `${HERE} and person_id = ${SCOPE}`,
  "core.test_result": `${HERE} and person_id = ${SCOPE}`,
  "core.interview": `${HERE} and person_id = ${SCOPE}`,
  "core.group_exposure": `${HERE} and person_id = ${SCOPE}`,
  "core.follow_check": `${HERE} and person_id = ${SCOPE}`,
  "core.follow_end": `${HERE} and person_id = ${SCOPE}`,
  "core.follow_up": `${HERE} and person_id = ${SCOPE}`,
  "core.contact_pair": `${HERE} and person_a = ${SCOPE} and person_b = ${SCOPE}`,
  "core.exposure": `${HERE} and exists (select 1 from core.contact_pair cp where cp.id = pair_id)`,
  "core.match_review": "false",
  "core.member": "false",
  "core.import": "false",
  "core.export": "false",
  "core.compare_run": "false",
};

const MINE = `${HERE} and recorded_by = (select core.ctx_user())`;

/** Rows another role sees, where that is less than the whole investigation. */
const ROLE_ROWS: Record<string, Partial<Record<Role, string>>> = {
  "core.export": { supervisor: MINE, epidemiologist: MINE },
};

/** Rows a role may change or remove, where that is less than what it sees. */
const ROLE_CHANGES: Record<string, Partial<Record<Role, string>>> = {
  "core.compare_run": { epidemiologist: MINE },
};

/** Rows any role may add, where that needs more than the investigation. */
const ADDS: Record<string, string> = {
  "core.export": `${MINE} and role = (select core.ctx_role())`,
  "core.compare_run": MINE,
};

/** Rows that belong to an account, whatever its role: nobody else sees or changes them. */
const OWN_ROWS: Record<string, string> = {
  "core.saved_filter": `${HERE} and account_id = (select core.ctx_user())`,
};

/** Rows a tracer may add, where that needs more than the investigation. */
const TRACER_ADDS: Record<string, string> = {
  "core.person": `${HERE} and recorded_by = (select core.ctx_user())`,
  "core.classification": `${HERE} and core.ctx_can_link(person_id)`,
  "core.test_result": `${HERE} and core.ctx_can_link(person_id)`,
  "core.interview": `${HERE} and core.ctx_can_link(person_id)`,
  "core.group_exposure": `${HERE} and core.ctx_can_link(person_id)`,
  "core.follow_check": `${HERE} and core.ctx_can_link(person_id)`,
  "core.follow_end": `${HERE} and core.ctx_can_link(person_id)`,
  "core.contact_pair": `${HERE} and core.ctx_can_link(person_a) and core.ctx_can_link(person_b)`,
  "core.exposure": `${HERE} and core.ctx_can_tell(pair_id)`,
};

/** Tables whose rows belong to an investigation, or are one. */
export const CORE_TABLES = [
  "core.investigation",
  "core.case_definition",
  "core.setting_change",
  "core.saved_filter",
  "core.team",
  "core.member",
  "core.place",
  "core.person",
  "core.classification",
  "core.test_result",
  "core.interview",
  "core.contact_pair",
  "core.exposure",
  "core.group_exposure",
  "core.follow_check",
  "core.follow_end",
  "core.follow_up",
  "core.match_review",
  "core.graph_change",
  "core.outbox",
  "core.import",
  "core.export",
  "core.compare_run",
] as const;

const IDENTITY_TABLES = [
  "identity.person",
  "identity.search_token",
  "identity.place",
  "identity.follow_check",
  "identity.interview_draft",
  "identity.import_stage",
  "identity.import_match",
  "identity.ref_alias",
  "identity.export_part",
  "identity.data_key",
] as const;

const AUTH_TABLES = [
  "auth.account",
  "auth.session",
  "auth.ctx_live",
  "auth.idempotency",
  "auth.first_officer_link",
  "auth.invitation",
  "auth.mail",
  "auth.attempt",
  "auth.meta",
  "auth.field_right",
] as const;

export const ALL_TABLES = [...CORE_TABLES, ...IDENTITY_TABLES, ...AUTH_TABLES, "audit.event"];

function here(table: string): string {
  if (table === "core.investigation") return "id = (select core.ctx_investigation())";
  return OWN_ROWS[table] ?? HERE;
}

function policy(
  table: string,
  name: string,
  command: string,
  role: string,
  clause: string,
): string {
  return `create policy ${name} on ${table} for ${command} to ${role} ${clause}`;
}

/**
 * Row level security of every table, forced, one set of policies per login. A table with no policy
 * for a login shows it no row. Statements are complete and may be run again.
 */
export function rowPolicies(): string[] {
  const out: string[] = [
    `do $$ declare p record; begin
       for p in select schemaname, tablename, policyname from pg_policies
         where schemaname in ('core','identity','auth','audit') loop
         execute format('drop policy %I on %I.%I', p.policyname, p.schemaname, p.tablename);
       end loop; end $$`,
  ];
  for (const table of ALL_TABLES) {
    out.push(`alter table ${table} enable row level security`);
    out.push(`alter table ${table} force row level security`);
  }
  for (const table of CORE_TABLES) {
    for (const role of ROLES) {
      const login = loginOf(role);
      const tracer = role === "tracer";
      const rows = (tracer && TRACER_ROWS[table]) || ROLE_ROWS[table]?.[role] || here(table);
      out.push(policy(table, `read_${role}`, "select", login, `using (${rows})`));
      const own = ROLE_CHANGES[table]?.[role] ?? rows;
      const writes = WRITES[table];
      if (writes?.insert.includes(role)) {
        const adds = (tracer && TRACER_ADDS[table]) || ADDS[table] || here(table);
        out.push(policy(table, `add_${role}`, "insert", login, `with check (${adds})`));
      }
      if (writes?.remove?.includes(role)) {
        out.push(policy(table, `remove_${role}`, "delete", login, `using (${own})`));
      }
      if (writes?.update?.roles.includes(role)) {
        // Asked per row: as a second list beside the one of the read policy, the index would be
        // searched for every pair of entries of both.
        const changes =
          tracer && table === "core.person" ? `${HERE} and core.ctx_may_name(id)` : own;
        out.push(
          policy(
            table,
            `change_${role}`,
            "update",
            login,
            `using (${changes}) with check (${here(table)})`,
          ),
        );
      }
    }
    out.push(policy(table, "read_system", "select", loginOf("system"), "using (true)"));
  }
  out.push(policy("core.outbox", "change_system", "update", loginOf("system"), "using (true)"));
  out.push(policy("core.outbox", "end_system", "delete", loginOf("system"), "using (true)"));
  out.push(policy("core.import", "change_system", "update", loginOf("system"), "using (true)"));
  out.push(policy("core.export", "change_system", "update", loginOf("system"), "using (true)"));
  out.push(
    policy("core.compare_run", "change_system", "update", loginOf("system"), "using (true)"),
  );
  for (const table of [
    ...AUTH_TABLES.filter((t) => t !== "auth.field_right"),
    "core.investigation",
    "core.member",
    "core.case_definition",
    "identity.data_key",
  ]) {
    out.push(policy(table, "all_auth", "all", loginOf("auth"), "using (true) with check (true)"));
  }
  out.push(policy("audit.event", "add_auth", "insert", loginOf("auth"), "with check (true)"));
  for (const role of ROLES) {
    const mine = `account_id = (select core.ctx_user()) and ${HERE}`;
    out.push(policy("audit.event", `add_${role}`, "insert", loginOf(role), `with check (${mine})`));
  }
  out.push(policy("audit.event", "read_officer", "select", loginOf("officer"), `using (${HERE})`));
  return out;
}
