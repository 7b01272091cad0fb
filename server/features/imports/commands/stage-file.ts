import { createHash } from "node:crypto";
import type { ImportReading } from "../../../../shared/contracts/imports.ts";
import { recordEvent } from "../../../audit/record-event.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import { announce } from "../../../events/record-graph-change.ts";
import type { Actor } from "../../../http/route.ts";
import type { InvestigationKeys } from "../../../identity/keys.ts";
import type { Services } from "../../../services.ts";
import { loadInvestigation } from "../../investigations/store.ts";
import { looksLikeFormula } from "../check-cell.ts";
import { pairsChecker } from "../check-pairs.ts";
import { peopleChecker } from "../check-people.ts";
import { COMPARED_FIELDS } from "../known-people.ts";
import { dropDoubts, keepDoubts } from "../match-store.ts";
import { createPause, type Pause } from "../pause.ts";
import { type Preview, previewPairs, previewPeople } from "../preview.ts";
import { ProblemList } from "../problem-list.ts";
import { planReading } from "../read-headings.ts";
import { type FileRow, readRows } from "../read-rows.ts";
import {
  type Checked,
  COLUMNS_OF,
  type ImportKind,
  type ImportProblem,
  type StagedPair,
  type StagedPerson,
} from "../staged-row.ts";
import { dropStage, keepImport, keepStage, openImport, restartCheck } from "../store.ts";
import { raiseLimits } from "./run-commit.ts";

/** Rows of a stored chunk; also how many references are looked up at a time. */
const CHUNK_ROWS = 2_000;
const HASH_BYTES = 1024 * 1024;

/**
 * SHA-256 of a file and what it and its columns are taken for, in slices. Where the headings are ours
 * as written, they say it themselves.
 */
async function fingerprint(
  kind: ImportKind,
  bytes: Buffer,
  { columns }: ImportReading,
  pause: Pause,
): Promise<string> {
  const hash = createHash("sha256").update(`${kind}\n`);
  if (columns.some(({ how }) => how !== "exact")) {
    hash.update(`${JSON.stringify(columns.map(({ column }) => column))}\n`);
  }
  for (let from = 0; from < bytes.length; from += HASH_BYTES) {
    hash.update(bytes.subarray(from, from + HASH_BYTES));
    await pause();
  }
  return hash.digest("hex");
}

interface Staging {
  tx: Tx;
  keys: InvestigationKeys;
  importId: string;
  pause: Pause;
}

/** Text columns in which a cell that looks like a formula is worth counting. */
const FREE_TEXT: ReadonlySet<string> = new Set(["name", "address", "occupation", "area", "place"]);

function formulasIn(cells: object): number {
  return Object.entries(cells).filter(
    ([column, cell]) => FREE_TEXT.has(column) && looksLikeFormula(String(cell)),
  ).length;
}

/** Checks a file row by row; keeps good rows in encrypted chunks, sets doubtful ones aside. */
async function checkRows<T extends StagedPerson | StagedPair>(
  { tx, keys, importId, pause }: Staging,
  rows: AsyncIterable<FileRow>,
  check: (row: FileRow) => Checked<T>,
  preview: Preview<T>,
): Promise<{ problems: ProblemList; counts: Record<string, number> }> {
  const problems = new ProblemList();
  let [read, bad, recordProblems, chunk, formulas] = [0, 0, 0, 0, 0];
  let staged: T[] = [];
  let found: ImportProblem[] = [];
  const flush = async () => {
    const { problems: onRecord, doubts } = await preview.add(staged);
    recordProblems += onRecord.length;
    problems.add([...found, ...onRecord]);
    const aside = new Set(doubts.map(({ row }) => row.line));
    const good = aside.size === 0 ? staged : staged.filter(({ line }) => !aside.has(line));
    for (let from = 0; from < good.length; from += CHUNK_ROWS) {
      await keepStage(tx, keys, importId, chunk, good.slice(from, from + CHUNK_ROWS));
      chunk += 1;
      await pause();
    }
    for (let from = 0; from < doubts.length; from += CHUNK_ROWS) {
      await keepDoubts(tx, keys, importId, doubts.slice(from, from + CHUNK_ROWS));
      await pause();
    }
    staged = [];
    found = [];
  };
  for await (const row of rows) {
    read += 1;
    const { row: good, problems: wrong } = check(row);
    if (good) {
      staged.push(good);
      formulas += formulasIn(good.cells);
    } else bad += 1;
    found.push(...wrong);
    if (staged.length >= preview.rowsAtOnce || found.length >= preview.rowsAtOnce) await flush();
    await pause();
  }
  await flush();
  const counts = preview.counts();
  bad += counts.unknownRows ?? 0;
  return {
    problems,
    counts: {
      ...counts,
      rows: read,
      good: read - bad - (counts.setAside ?? 0),
      bad,
      formulas,
      problems: problems.count,
      recordProblems,
      stagedAt: Math.floor(now().getTime() / 1000),
    },
  };
}

/**
 * Checks every row of a file and stages the good ones; nothing reaches the record. The same file
 * read the same way for the same kind is the same import: one that is on record whole stays as it is. One that is not, or
 * of which rows were left out for a reference that was not on record, is checked again.
 *
 * @param chosen by position the column each column of the file is, or null; see `planReading`
 * @returns id of the import
 * @throws HttpProblem 422 when the file as a whole cannot be read; nothing is kept then
 */
export async function stageFile(
  tx: Tx,
  services: Pick<Services, "keys">,
  actor: Actor,
  kind: ImportKind,
  bytes: Buffer,
  chosen: readonly (string | null)[] | null,
): Promise<string> {
  await raiseLimits(tx);
  const pause = createPause();
  const reading = await planReading(bytes, kind, chosen);
  const { id, state, unknownRows, fresh } = await openImport(
    tx,
    actor,
    kind,
    await fingerprint(kind, bytes, reading, pause),
    reading,
  );
  if (state === "committing" || (state === "committed" && unknownRows === 0)) return id;
  if (!fresh) {
    await dropStage(tx, id);
    await dropDoubts(tx, id);
    await restartCheck(tx, id);
  }
  const settings = await loadInvestigation(tx, actor.investigationId);
  const keys = await services.keys.of(tx, actor.investigationId);
  const today = dayIn(settings.timeZone, now());
  const staging: Staging = { tx, keys, importId: id, pause };
  const rows = readRows(bytes, COLUMNS_OF[kind].all, reading);
  const compare = { tx, keys, importId: id, role: actor.role, country: settings.countryCode };
  const { counts, problems } =
    kind === "people"
      ? await checkRows(
          staging,
          rows,
          peopleChecker(today, settings.timeZone),
          previewPeople(compare, actor, pause),
        )
      : await checkRows(
          staging,
          rows,
          pairsChecker(today, settings.timeZone),
          previewPairs(tx, keys),
        );
  await keepImport(tx, id, { state: "ready", counts, problems: problems.sorted() });
  await recordEvent(tx, {
    action: "import.staged",
    accountId: actor.accountId,
    role: actor.role,
    investigationId: actor.investigationId,
    fields: (counts.compared ?? 0) > 0 ? COMPARED_FIELDS : [],
    counts,
  });
  await announce(tx, "imports", id);
  return id;
}
