import type { ExportFilter } from "../../../shared/contracts/exports.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { InvestigationKeys } from "../../identity/keys.ts";

/** What the parts of making a file share: one transaction, one moment of the record. */
export interface BuildContext {
  tx: Tx;
  actor: Actor;
  /** For opening identity; null where the file holds none. */
  keys: InvestigationKeys | null;
  exportId: string;
  filter: ExportFilter;
  /** Columns that are filled. */
  columns: ReadonlySet<string>;
  identified: boolean;
  /** Takes one record of the file. */
  write(cells: readonly (string | null | undefined)[]): Promise<void>;
  /** Told after each slice, from 0 to 1; throws when the file was cancelled. */
  progress(share: number): Promise<void>;
}

/** People or tellings handled at a stretch: some milliseconds of work. */
export const SLICE = 500;

/** Lets other requests be served. */
export const turn = () => new Promise<void>((resolve) => setImmediate(resolve));

/** A list in slices, each with the place of its first item. */
export function* slices<T>(items: readonly T[], size = SLICE): Generator<[number, T[]]> {
  for (let from = 0; from < items.length; from += size)
    yield [from, items.slice(from, from + size)];
}
