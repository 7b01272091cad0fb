import { sql } from "drizzle-orm";
import { exportedIdentity, namesHouseholds } from "../../../shared/export-columns.ts";
import { type IdentityKey, openCipher, placeName } from "../../identity/records.ts";
import { type BuildContext, slices, turn } from "./build-context.ts";

/** Fields of one person that were opened; `household` is the household's name. */
export type OpenedFields = Partial<Record<IdentityKey | "household", string>>;

const idList = (ids: readonly string[]) => sql`${sql.param(`{${ids.join(",")}}`)}::uuid[]`;
const textList = (values: readonly string[]) => sql`${sql.param(`{${values.join(",")}}`)}::text[]`;

/** Opens identity for one export: first on record whose and what, then slice by slice. */
export interface IdentityDoor {
  /** References by person, for everybody of the export; people without one are absent. */
  refs: ReadonlyMap<string, string>;
  /** Everything but the reference, of people `from` … `from + count - 1` of the list (from 0). */
  open(from: number, count: number): Promise<Map<string, OpenedFields>>;
}

async function openSlice(
  context: BuildContext,
  from: number,
  count: number,
  fields: readonly string[],
): Promise<Map<string, OpenedFields>> {
  const { tx, keys, exportId } = context;
  const out = new Map<string, OpenedFields>();
  if (!keys) return out;
  const found = await tx.execute<{
    person_id: string;
    field: IdentityKey | "household";
    place_id: string | null;
    cipher: Buffer;
  }>(
    sql`select person_id, field, place_id, cipher from identity.open_for_export(
          ${exportId}::uuid, ${from + 1}, ${from + count}, ${textList(fields)})`,
  );
  for (const row of found.rows) {
    const opened = out.get(row.person_id) ?? {};
    opened[row.field] =
      row.field === "household"
        ? placeName.open(keys, row.place_id ?? "", row.cipher)
        : openCipher(keys, row.person_id, row.field, row.cipher);
    out.set(row.person_id, opened);
  }
  return out;
}

/**
 * Puts the opening on record (whose identity, which fields) and reads the references.
 *
 * @param people ids in the order of the file
 * @param whole whether more than references is opened
 */
export async function openDoor(
  context: BuildContext,
  people: readonly string[],
  whole: boolean,
): Promise<IdentityDoor> {
  const { tx, actor, exportId } = context;
  const all: string[] = exportedIdentity(actor.role);
  const fields = whole ? all : all.filter((key) => key === "ref");
  if (whole && namesHouseholds(actor.role, context.identified)) fields.push("household");
  await tx.execute(
    sql`select identity.begin_export_opening(${exportId}::uuid, ${idList(people)}, ${textList(fields)})`,
  );
  const refs = new Map<string, string>();
  for (const [from, slice] of slices(people)) {
    for (const [id, opened] of await openSlice(context, from, slice.length, ["ref"])) {
      if (opened.ref) refs.set(id, opened.ref);
    }
    await turn();
  }
  const others = fields.filter((key) => key !== "ref");
  return {
    refs,
    open: async (from, count) =>
      others.length > 0 ? openSlice(context, from, count, others) : new Map(),
  };
}

/**
 * The reference under which a person stands in a file with identity: their own, else the study
 * number. A study number that is somebody else's reference (of a file that was brought in) would
 * make two people one; it gets a letter more.
 */
export function refNamer(
  refs: ReadonlyMap<string, string>,
): (id: string, studyNumber: string) => string {
  const taken = new Set(refs.values());
  return (id, studyNumber) => {
    const own = refs.get(id);
    if (own !== undefined) return own;
    let name = studyNumber;
    while (taken.has(name)) name += "S";
    return name;
  };
}

/** Names of households by place, recorded by the database's function. */
export async function openHouseholds(
  context: BuildContext,
  placeIds: readonly string[],
): Promise<Map<string, string>> {
  const { tx, keys, exportId } = context;
  const names = new Map<string, string>();
  if (!keys) return names;
  for (const [, slice] of slices(placeIds, 2000)) {
    const found = await tx.execute<{ place_id: string; cipher: Buffer }>(
      sql`select place_id, cipher from identity.open_export_places(${exportId}::uuid, ${idList(slice)})`,
    );
    for (const row of found.rows) {
      names.set(row.place_id, placeName.open(keys, row.place_id, row.cipher));
    }
    await turn();
  }
  return names;
}
