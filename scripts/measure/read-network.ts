import type { PairEnds } from "../../shared/core/index.ts";
import { checkCells } from "./check-cells.ts";
import { type BadRow, type CsvTable, readCsv } from "./read-csv.ts";

/** Counts of pairs with two interviewed ends, by how many of the two named the other. */
export type DoubleReports = { readonly both: number; readonly one: number };

/** What the files hold, people numbered in order of appearance. References do not leave here. */
export type FileNetwork = {
  readonly n: number;
  readonly ends: PairEnds;
  /** One flag per person; null when the network is taken as complete. */
  readonly isInterviewed: Uint8Array | null;
  /** Null when the pairs file does not say who named whom. */
  readonly doubleReports: DoubleReports | null;
};

export type ReadNetwork = {
  readonly network: FileNetwork | null;
  readonly peopleFaults: readonly BadRow[];
  readonly pairsFaults: readonly BadRow[];
};

/** "yes" and "no"; blank, unknown and refused are values too, and none of them an interview. */
const INTERVIEWED = new Set(["yes", "no", "", "unknown", "refused"]);

type People = { numbers: Map<string, number>; interviewed: boolean[] };

function readPeople(table: CsvTable, people: People): BadRow[] {
  const bad = [...table.bad, ...checkCells("people", table)];
  for (const { line, get } of table.rows) {
    const ref = get("ref");
    const interviewed = get("interviewed");
    if (ref === "") bad.push({ line, column: "ref", code: "required" });
    else if (people.numbers.has(ref)) bad.push({ line, column: "ref", code: "duplicate_ref" });
    else {
      people.numbers.set(ref, people.numbers.size);
      people.interviewed.push(interviewed === "yes");
    }
    if (!INTERVIEWED.has(interviewed)) {
      bad.push({ line, column: "interviewed", code: "not_in_list" });
    }
  }
  return bad;
}

type Telling = { a: number; b: number; namedBy: number | null };

/** Reads the pairs; with `closed` people every reference must be among them already. */
function readPairs(table: CsvTable, people: People, closed: boolean, tellings: Telling[]) {
  const bad = [...table.bad, ...checkCells("pairs", table)];
  for (const { line, get } of table.rows) {
    const ends: number[] = [];
    const refs = [get("ref_a"), get("ref_b")] as const;
    for (const [side, ref] of refs.entries()) {
      const column = side === 0 ? "ref_a" : "ref_b";
      if (ref === "") bad.push({ line, column, code: "required" });
      else if (side === 1 && ref === refs[0]) bad.push({ line, column, code: "self_contact" });
      else {
        let number = people.numbers.get(ref);
        if (number === undefined && closed) {
          bad.push({ line, column, code: "unknown_ref" });
          continue;
        }
        if (number === undefined) {
          number = people.numbers.size;
          people.numbers.set(ref, number);
        }
        ends.push(number);
      }
    }
    const namedBy = get("named_by");
    if (namedBy !== "" && namedBy !== refs[0] && namedBy !== refs[1]) {
      bad.push({ line, column: "named_by", code: "named_by_other" });
      continue;
    }
    const [a, b] = ends;
    if (a === undefined || b === undefined) continue;
    tellings.push({ a, b, namedBy: namedBy === "" ? null : namedBy === refs[0] ? a : b });
  }
  return bad;
}

/** Among pairs with two interviewed ends: how many were named by both, and by one only. */
function countDoubleReports(tellings: readonly Telling[], interviewed: Uint8Array): DoubleReports {
  const sides = new Map<string, number>();
  for (const { a, b, namedBy } of tellings) {
    if (namedBy === null || !interviewed[a] || !interviewed[b]) continue;
    const low = Math.min(a, b);
    const key = `${low} ${Math.max(a, b)}`;
    sides.set(key, (sides.get(key) ?? 0) | (namedBy === low ? 1 : 2));
  }
  let both = 0;
  for (const named of sides.values()) if (named === 3) both++;
  return { both, one: sides.size - both };
}

/**
 * Reads the pairs file and, when given, the people file into a network.
 *
 * Without a people file the people are the references of the pairs and the network is complete;
 * with one, every pair must name people of it, and the network is complete unless the file has a
 * column `interviewed`.
 */
export function readNetwork(pairs: Uint8Array, people: Uint8Array | null): ReadNetwork {
  const found: People = { numbers: new Map(), interviewed: [] };
  const peopleTable = people ? readCsv(people, ["ref"]) : null;
  const peopleFaults = peopleTable ? readPeople(peopleTable, found) : [];
  // A people file that could not be read would make every reference below it unknown.
  const readable = peopleTable === null || peopleTable.rows.length > 0 || !peopleTable.bad.length;

  const pairsTable = readCsv(pairs, ["ref_a", "ref_b"]);
  const tellings: Telling[] = [];
  const pairsFaults = readPairs(pairsTable, found, peopleTable !== null && readable, tellings);
  if (peopleFaults.length > 0 || pairsFaults.length > 0) {
    const byLine = (x: BadRow, y: BadRow) => x.line - y.line;
    return {
      network: null,
      peopleFaults: peopleFaults.sort(byLine),
      pairsFaults: pairsFaults.sort(byLine),
    };
  }
  const isInterviewed = peopleTable?.columns.has("interviewed")
    ? Uint8Array.from(found.interviewed, (yes) => (yes ? 1 : 0))
    : null;
  const network = {
    n: found.numbers.size,
    ends: {
      a: Int32Array.from(tellings, (telling) => telling.a),
      b: Int32Array.from(tellings, (telling) => telling.b),
    },
    isInterviewed,
    doubleReports:
      isInterviewed && pairsTable.columns.has("named_by")
        ? countDoubleReports(tellings, isInterviewed)
        : null,
  };
  return { network, peopleFaults, pairsFaults };
}
