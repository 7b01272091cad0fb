import type { Tx } from "../../../db/with-tx.ts";
import type { Actor } from "../../../http/route.ts";
import type { InvestigationKeys } from "../../../identity/keys.ts";
import type { InvestigationRow } from "../../investigations/store.ts";
import type { Pause } from "../pause.ts";
import type { PlaceBook } from "../place-book.ts";
import type { ProblemList } from "../problem-list.ts";

/** What a commit has stored so far. */
export interface CommitCounts {
  addedPeople: number;
  /** People of the file who were on record, and whose identity was compared. */
  knownPeople: number;
  /** People on record of whom at least one blank was filled. */
  filledPeople: number;
  addedTests: number;
  addedInterviews: number;
  addedPairs: number;
  /** Tellings added. */
  addedExposures: number;
  /** Tellings that were on record, or twice in the file. */
  repeated: number;
  addedPlaces: number;
  /** Cells that differ from what is on record. */
  conflicts: number;
  /** Rows left out because a reference is not on record. */
  unknownRows: number;
}

/** Everything the parts of a commit share: one transaction, settings, and the count. */
export interface CommitContext {
  tx: Tx;
  actor: Actor;
  keys: InvestigationKeys;
  settings: InvestigationRow;
  importId: string;
  createMissing: boolean;
  /** Local day of the investigation. */
  today: string;
  places: PlaceBook;
  counts: CommitCounts;
  problems: ProblemList;
  pause: Pause;
  /** Told after each batch of the file how many rows it had. */
  progress(rows: number): Promise<void>;
}

/** A count of nothing. */
export function noCounts(): CommitCounts {
  return {
    addedPeople: 0,
    knownPeople: 0,
    filledPeople: 0,
    addedTests: 0,
    addedInterviews: 0,
    addedPairs: 0,
    addedExposures: 0,
    repeated: 0,
    addedPlaces: 0,
    conflicts: 0,
    unknownRows: 0,
  };
}
