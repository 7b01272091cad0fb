import type { Export } from "../../../shared/contracts/exports.ts";
import { now } from "../../clock.ts";
import type { Actor } from "../../http/route.ts";
import type { ExportRow } from "./store.ts";

/** The fixed name under which a file is saved; its first characters of the id find it in the list. */
export function fileNameOf(row: Pick<ExportRow, "id" | "kind">): string {
  return `strandline-${row.kind}-${row.id.slice(0, 8)}.csv`;
}

/** True while the acting person may have the file: their own, in the role it was made in. */
export function mayDownload(row: ExportRow, actor: Actor): boolean {
  return (
    row.state === "ready" &&
    row.accountId === actor.accountId &&
    row.role === actor.role &&
    row.expiresAt !== null &&
    row.expiresAt > now().toISOString()
  );
}

/** An export as the acting person sees it. */
export function presentExport(row: ExportRow, actor: Actor): Export {
  const { parts: _parts, ...shown } = row;
  const mine = row.accountId === actor.accountId;
  return {
    ...shown,
    fileName: fileNameOf(row),
    can: {
      download: mayDownload(row, actor),
      remove:
        (row.state === "building" || row.state === "ready") && (mine || actor.role === "officer"),
    },
  } as Export;
}
