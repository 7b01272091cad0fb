import { IDENTITY_FIELDS } from "../../../shared/fields/person.ts";
import { FIELDS, openableKeys, readableColumns } from "../../../shared/fields.ts";
import { ROLES, type Role } from "../../../shared/roles.ts";
import { ALL_TABLES, CORE_TABLES, loginOf, WRITES } from "./policies.ts";

const ROLE_LOGINS = ROLES.map(loginOf).join(", ");
const LOGINS = `${ROLE_LOGINS}, ${loginOf("auth")}, ${loginOf("system")}`;

function columns(list: readonly string[]): string {
  return list.map((column) => `"${column}"`).join(", ");
}

/** Every column of a table, as the registry lists it. */
function listed(table: string): string[] {
  return FIELDS.filter((field) => field.table === table).map((field) => field.column);
}

/** Functions a role's login may call; everything else is revoked from everyone. */
const FUNCTIONS: Record<string, readonly (Role | "system" | "auth")[]> = {
  "core.ctx()": ROLES,
  "core.ctx_user()": ROLES,
  "core.ctx_investigation()": ROLES,
  "core.ctx_role()": ROLES,
  "core.ctx_teams()": ROLES,
  "core.ctx_held()": ["tracer"],
  "core.ctx_people()": ["tracer"],
  "core.ctx_named_people()": ["tracer"],
  "core.ctx_named_of(uuid[])": ["tracer", "supervisor", "officer"],
  "core.ctx_can_link(uuid)": ["tracer", "supervisor", "officer"],
  "core.ctx_can_tell(uuid)": ["tracer", "supervisor", "officer"],
  "core.ctx_may_name(uuid)": ["tracer", "supervisor", "officer"],
  "core.ctx_near(uuid, uuid, text, uuid, boolean)": [],
  "core.pairs_for(uuid, uuid[])": ["tracer", "supervisor", "officer"],
  "core.follow_up_days(uuid)": ["tracer", "supervisor", "officer"],
  "core.day_zero_of(uuid[])": [],
  "core.refresh_follow_up(uuid[])": [],
  "core.refresh_together(uuid[])": [],
  "core.exposures_added()": [],
  "core.exposures_changed()": [],
  "core.pairs_changed()": [],
  "core.people_added()": [],
  "core.people_changed()": [],
  "core.classifications_added()": [],
  "core.checks_written()": [],
  "core.ends_written()": [],
  "identity.tokens_added()": [],
  "identity.tokens_dropped()": [],
  "core.followed_near()": ["tracer"],
  "core.has_demo_members()": ["supervisor", "officer"],
  "core.empty_practice()": ["supervisor"],
  "identity.put_check_note(uuid, bytea)": ["tracer", "supervisor"],
  "identity.open_check_notes(uuid)": ["tracer", "supervisor"],
  "core.day_lasts(text, text)": [...ROLES, "auth"],
  "core.account_of_email(text)": ["supervisor", "officer"],
  "core.team_use()": ["supervisor", "officer"],
  "core.bump_graph()": ["tracer", "supervisor", "officer"],
  "core.next_numbers(integer)": ["tracer", "supervisor", "officer"],
  "core.announce(text, uuid, bigint)": ROLES,
  "core.fill_occupations(uuid, jsonb)": ["supervisor", "officer"],
  "core.sweep_import_stages()": ["system"],
  "auth.invite(uuid, text, text, uuid, text, text, uuid, bytea)": ["supervisor", "officer"],
  "auth.withdraw_invitation(uuid)": ["supervisor", "officer"],
  "auth.claim_key(uuid, text, text)": ROLES,
  "auth.keep_receipt(uuid, smallint, jsonb)": ROLES,
  "identity.open_people(uuid[], text[], text)": ["tracer", "supervisor", "officer"],
  "identity.open_places(uuid[])": ["tracer", "supervisor"],
  "core.keep_export_part(uuid, integer, bytea)": ["supervisor", "epidemiologist", "officer"],
  "core.read_export_part(uuid, integer)": ["supervisor", "epidemiologist", "officer"],
  "core.drop_export_parts(uuid)": ["supervisor", "epidemiologist", "officer"],
  "core.sweep_exports()": ["system"],
  "identity.begin_export_opening(uuid, uuid[], text[])": ["supervisor", "officer"],
  "identity.open_for_export(uuid, integer, integer, text[])": ["supervisor", "officer"],
  "identity.open_export_places(uuid, uuid[])": ["supervisor"],
  "identity.find_people(bytea[], bytea[], integer)": ["tracer", "supervisor"],
  "identity.flag_hidden_matches(uuid, bytea[], bytea[])": ["tracer", "supervisor"],
  "identity.people_by_ref(bytea[])": ["supervisor", "officer"],
  "identity.ref_taken(bytea, uuid)": ["tracer", "supervisor", "officer"],
  "identity.open_for_import(uuid, uuid[])": ["supervisor", "officer"],
  "identity.households_by_token(bytea[])": ["tracer", "supervisor", "officer"],
  "identity.put_place(uuid, bytea, bytea)": ["tracer", "supervisor", "officer"],
  "identity.wrapped_key()": ["tracer", "supervisor", "officer"],
  "identity.read_draft(uuid)": ["tracer", "supervisor"],
  "identity.keep_draft(uuid, bytea, integer)": ["tracer", "supervisor"],
  "identity.drop_draft(uuid)": ["tracer", "supervisor"],
  "identity.keep_stage(uuid, integer, bytea)": ["supervisor", "officer"],
  "identity.read_stage(uuid, integer, integer)": ["supervisor", "officer"],
  "identity.drop_stage(uuid)": ["supervisor", "officer"],
  "identity.resembling(jsonb)": ["supervisor", "officer"],
  "identity.keep_import_matches(uuid, jsonb)": ["supervisor", "officer"],
  "identity.drop_import_matches(uuid)": ["supervisor", "officer"],
  "identity.open_import_matches(uuid, uuid[], text, integer, integer)": ["supervisor", "officer"],
  "identity.count_import_matches(uuid)": ["supervisor", "officer"],
  "identity.decide_import_matches(uuid, uuid[], text)": ["supervisor", "officer"],
  "identity.waiting_refs(bytea[])": ["supervisor", "officer"],
  "identity.add_ref_aliases(jsonb)": ["supervisor", "officer"],
  "identity.put_people(jsonb, jsonb, smallint[])": ["tracer", "supervisor", "officer"],
  [`identity.add_people(uuid[], bytea[], bytea[], bytea[], text[], bytea[], text[], bytea[], text[],
    bytea[], integer[], bytea[], bytea[], integer[], smallint[], bytea[])`]: [
    "supervisor",
    "officer",
  ],
  "identity.put_places(uuid[], bytea[], bytea[])": ["supervisor", "officer"],
};

/** Masked and coarse columns a role gets from `identity.person`, without any ciphertext. */
export function maskedColumns(role: Role): string[] {
  const out: string[] = [];
  for (const field of IDENTITY_FIELDS) {
    const access = field.access[role];
    if (field.masked && access !== "none") out.push(field.masked.column);
    if (field.coarse && access !== "none") out.push(field.coarse.column);
  }
  return out;
}

/** Generated views: one of masked identity per role that has any, and the members with their names. */
export function views(): string[] {
  const out = [
    "drop schema if exists views cascade",
    "create schema views authorization strandline_owner",
  ];
  for (const role of ROLES) {
    const masked = maskedColumns(role);
    if (masked.length === 0) continue;
    const scope =
      role === "tracer" ? " and person_id = any ((select core.ctx_named_people())::uuid[])" : "";
    out.push(
      `create view views.person_${role} with (security_barrier) as
       select person_id, ${columns(masked)} from identity.person
       where investigation_id = (select core.ctx_investigation())
         and (select core.ctx_role()) = '${role}'${scope}`,
    );
  }
  out.push(
    `create view views.member with (security_barrier) as
     select m.id, m.account_id, a.display_name, a.email, m.role, m.team_id, t.name as team, m.since,
       m.ends_on, m.ended_at, m.version,
       m.ended_at is null and core.day_lasts(m.ends_on, v.time_zone) as live
     from core.member m join auth.account a on a.id = m.account_id
     join core.investigation v on v.id = m.investigation_id
     left join core.team t on t.id = m.team_id
     where m.investigation_id = (select core.ctx_investigation())`,
    `create view views.invitation with (security_barrier) as
     select i.id, i.email, i.role, t.name as team, a.display_name as invited_by, i.recorded_at,
       i.ends_on, i.expires_at
     from auth.invitation i join core.investigation v on v.id = i.investigation_id
     left join core.team t on t.id = i.team_id
     left join auth.account a on a.id = i.recorded_by
     where i.kind = 'invitation' and i.used_at is null and i.expires_at > now()
       and core.day_lasts(i.ends_on, v.time_zone)
       and i.investigation_id = (select core.ctx_investigation())
       and (select core.ctx_role()) in ('supervisor', 'officer')`,
    `create view views.field_right with (security_barrier) as
     select role, field from auth.field_right where (select core.ctx_role()) = 'officer'`,
  );
  return out;
}

/** Rights of the logins, from the field registry; whatever was granted before is taken back first. */
export function grants(): string[] {
  const out: string[] = [];
  for (const table of ALL_TABLES) {
    out.push(`alter table ${table} owner to strandline_owner`);
    // Column rights fall with the table's own, so this clears both.
    out.push(`revoke all on ${table} from public, ${LOGINS}`);
  }
  for (const schema of ["core", "identity", "auth", "audit", "views"]) {
    out.push(`revoke all on schema ${schema} from public, ${LOGINS}`);
    out.push(`revoke all on all functions in schema ${schema} from public, ${LOGINS}`);
    out.push(`grant usage on schema ${schema} to strandline_owner`);
  }
  out.push(`grant usage on schema core to ${LOGINS}`);
  out.push(`grant usage on schema audit to ${ROLE_LOGINS}, ${loginOf("auth")}`);
  out.push(`grant usage on schema auth to ${loginOf("auth")}`);
  for (const role of ROLES) {
    const login = loginOf(role);
    out.push(`grant usage on schema views to ${login}`);
    // Functions only: tables of these two schemas carry no right for any role login.
    out.push(`grant usage on schema auth to ${login}`);
    if (role !== "epidemiologist") out.push(`grant usage on schema identity to ${login}`);
    for (const table of CORE_TABLES) {
      const readable = readableColumns(table, role);
      if (readable.length > 0)
        out.push(`grant select (${columns(readable)}) on ${table} to ${login}`);
      const writes = WRITES[table];
      if (writes?.insert.includes(role)) {
        const insertable = listed(table).filter(
          (column) => !(column === "id" && table === "core.graph_change"),
        );
        out.push(`grant insert (${columns(insertable)}) on ${table} to ${login}`);
      }
      if (writes?.remove?.includes(role)) out.push(`grant delete on ${table} to ${login}`);
      if (writes?.update?.roles.includes(role)) {
        out.push(`grant update (${columns(writes.update.columns)}) on ${table} to ${login}`);
      }
    }
    if (maskedColumns(role).length > 0)
      out.push(`grant select on views.person_${role} to ${login}`);
    out.push(
      `grant insert (id, investigation_id, account_id, role, action, person_ids, fields, counts) on audit.event to ${login}`,
    );
  }
  for (const role of ["supervisor", "officer"] as const) {
    out.push(`grant select on views.member, views.invitation to ${loginOf(role)}`);
  }
  out.push(`grant select on audit.event, views.field_right to ${loginOf("officer")}`);
  for (const table of CORE_TABLES) out.push(`grant select on ${table} to ${loginOf("system")}`);
  out.push(`grant update (done_at), delete on core.outbox to ${loginOf("system")}`);
  out.push(`grant update (state, progress) on core.import to ${loginOf("system")}`);
  out.push(`grant update (state, progress, failure) on core.export to ${loginOf("system")}`);
  out.push(
    `grant update (state, progress, reached, input, result, failure, people, pairs, graph_version,
       cut_off, as_of, from_day, to_day, finished_at) on core.compare_run to ${loginOf("system")}`,
  );
  const auth = loginOf("auth");
  out.push(
    `grant select, insert, update, delete on auth.account, auth.session, auth.ctx_live,
       auth.idempotency, auth.first_officer_link, auth.invitation, auth.mail, auth.attempt,
       auth.meta to ${auth}`,
    `grant select, insert on core.investigation, core.case_definition, identity.data_key to ${auth}`,
    `grant select, insert, update (ended_at) on core.member to ${auth}`,
    `grant usage on schema identity to ${auth}`,
    `grant insert on audit.event to ${auth}`,
  );
  for (const [signature, roles] of Object.entries(FUNCTIONS)) {
    out.push(`alter function ${signature} owner to strandline_owner`);
    out.push(`revoke all on function ${signature} from public`);
    if (roles.length > 0)
      out.push(`grant execute on function ${signature} to ${roles.map(loginOf).join(", ")}`);
  }
  out.push("delete from auth.field_right");
  for (const role of ROLES) {
    for (const key of openableKeys(role)) {
      out.push(`insert into auth.field_right (role, field) values ('${role}', '${key}')`);
    }
  }
  return out;
}
