import type { CompareRunItem } from "../../../shared/contracts/compare.ts";
import type { Actor } from "../../http/route.ts";
import type { RunRow } from "./store.ts";

/** True where the acting person may rename, cancel or delete a run; the database says the same. */
export function mayChange(row: Pick<RunRow, "accountId">, actor: Actor): boolean {
  return row.accountId === actor.accountId || actor.role === "supervisor";
}

/** A run as the list tells it. */
export function presentRun(row: RunRow, actor: Actor): CompareRunItem {
  const { accountId: _account, failure: _failure, ...shown } = row;
  return { ...shown, can: { change: mayChange(row, actor) } } as CompareRunItem;
}
