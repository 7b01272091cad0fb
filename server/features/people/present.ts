import type { EventName } from "../../../shared/events.ts";
import { IDENTITY_FIELDS } from "../../../shared/fields/person.ts";
import { openableKeys, personKeys } from "../../../shared/fields.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { KeyRing } from "../../identity/keys.ts";
import { type Identity, type IdentityKey, openPeople, openPlaces } from "../../identity/records.ts";
import { type CorePerson, maskedOf } from "./queries.ts";

/** Identity shown in lists; notes never are, and the rest waits until a record is opened. */
export const LIST_FIELDS: readonly IdentityKey[] = ["ref", "name", "phone"];

/** Everything of identity on a person's own page. */
export const PAGE_FIELDS: readonly IdentityKey[] = [
  "ref",
  "name",
  "phone",
  "email",
  "birthDate",
  "address",
  "note",
];

function abilities(actor: Actor, person: CorePerson) {
  const works = (actor.role === "tracer" || actor.role === "supervisor") && person.mine;
  return { edit: works, interview: works, addTest: works };
}

/**
 * Presents people key by key as the registry lists them for the acting role, opening (and so
 * recording) the identity fields asked for. People whose identity is not the acting person's to
 * open come without those keys.
 */
export async function presentPeople(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  rows: readonly CorePerson[],
  fields: readonly IdentityKey[],
  action: EventName,
): Promise<Record<string, unknown>[]> {
  const openable = openableKeys(actor.role);
  const wanted = fields.filter((field) => openable.includes(field));
  const mine = rows.filter((row) => row.mine);
  let opened = new Map<string, Identity>();
  let households = new Map<string, string>();
  if (wanted.length > 0 && mine.length > 0) {
    const keys = await ring.of(tx, actor.investigationId);
    opened = await openPeople(
      tx,
      keys,
      mine.map((row) => row.id),
      wanted,
      action,
    );
    if (openable.includes("address")) {
      const places = mine.flatMap((row) => (row.householdId ? [row.householdId] : []));
      households = await openPlaces(tx, keys, places);
    }
  }
  const forms = IDENTITY_FIELDS.flatMap((field) => {
    const access = field.access[actor.role];
    return (access === "masked" && field.masked) || (access === "coarse" && field.coarse) || [];
  });
  const ids = forms.length > 0 ? rows.map((row) => row.id) : [];
  const masked = await maskedOf(tx, actor.role, ids);
  const allowed = personKeys(actor.role);
  return rows.map((row) => {
    const identity = row.mine ? (opened.get(row.id) ?? {}) : undefined;
    const out: Record<string, unknown> = {};
    for (const key of allowed) {
      if (key in row) out[key] = row[key];
    }
    if (identity) for (const field of wanted) out[field] = identity[field] ?? null;
    if (identity && allowed.includes("household") && wanted.length > 0) {
      out.household = row.householdId ? (households.get(row.householdId) ?? null) : null;
    }
    for (const form of forms) out[form.key] = masked.get(row.id)?.[form.column] ?? null;
    out.diedDate = row.outcome === "died" ? row.outcomeDate : null;
    out.can = abilities(actor, row);
    return out;
  });
}
