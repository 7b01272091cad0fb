import { MISSING_GROUP, type PairEnds } from "../../shared/core/index.ts";
import { checkCells } from "./check-cells.ts";
import { type BadRow, type CsvTable, readCsv } from "./read-csv.ts";

/** Counts of pairs with two interviewed ends, by how many of the two named the other. */
export type DoubleReports = { readonly both: number; readonly one: number };

/** The classes of one column of the people file. */
export type Attribute = {
  /** Values in order of appearance; a class is known by its number. */
  readonly values: readonly string[];
  /** Class of each person; `MISSING_GROUP` for blank, unknown and refused. */
  readonly classOf: Int32Array;
};

/** What the files hold, people numbered in order of appearance. */
export type FileNetwork = {
  readonly n: number;
  readonly refs: readonly string[];
  readonly ends: PairEnds;
  /** One flag per person; null when the network is taken as complete. */
  readonly isInterviewed: Uint8Array | null;
  /** Interviewed people in the order of their interviews; empty for a complete network. */
  readonly interviewOrder: Int32Array;
  /** Who named whom: `a[k]` named `b[k]`. A row without `named_by` is there in both directions. */
  readonly tellings: PairEnds;
  /** Null when the pairs file does not say who named whom. */
  readonly doubleReports: DoubleReports | null;
  /** The column asked for; null when none was, or the people file lacks it. */
  readonly attribute: Attribute | null;
};

export type ReadNetwork = {
  readonly network: FileNetwork | null;
  readonly peopleFaults: readonly BadRow[];
  readonly pairsFaults: readonly BadRow[];
};

const NOBODY = new Int32Array(0);

/** "yes" and "no"; blank, unknown and refused are values too, and none of them an interview. */
const INTERVIEWED = new Set(["yes", "no", "", "unknown", "refused"]);

type People = {
  numbers: Map<string, number>;
  interviewed: boolean[];
  dates: string[];
  values: string[];
};

function readPeople(table: CsvTable, people: People, column: string | null): BadRow[] {
  const bad = [...table.bad, ...checkCells("people", table)];
  for (const { line, get } of table.rows) {
    const ref = get("ref");
    const interviewed = get("interviewed");
    if (ref === "") bad.push({ line, column: "ref", code: "required" });
    else if (people.numbers.has(ref)) bad.push({ line, column: "ref", code: "duplicate_ref" });
    else {
      people.numbers.set(ref, people.numbers.size);
      people.interviewed.push(interviewed === "yes");
      people.dates.push(get("interview_date"));
      people.values.push(column === null ? "" : get(column));
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

/** People with a day of interview first, by that day; else in the order of the file. */
function interviewOrder({ interviewed, dates }: People): Int32Array {
  const people = interviewed.flatMap((yes, person) => (yes ? [person] : []));
  const dated = people.filter((person) => dates[person] !== "");
  // Days are written year first, so their order is that of the letters; sorting keeps ties as read.
  dated.sort((x, y) => {
    const [one = "", other = ""] = [dates[x], dates[y]];
    return one < other ? -1 : one > other ? 1 : 0;
  });
  return Int32Array.from([...dated, ...people.filter((person) => dates[person] === "")]);
}

function directedTellings(tellings: readonly Telling[]): PairEnds {
  const a: number[] = [];
  const b: number[] = [];
  for (const telling of tellings) {
    const { namedBy } = telling;
    for (const [from, to] of [
      [telling.a, telling.b],
      [telling.b, telling.a],
    ] as const) {
      if (namedBy !== null && namedBy !== from) continue;
      a.push(from);
      b.push(to);
    }
  }
  return { a: Int32Array.from(a), b: Int32Array.from(b) };
}

/** Not asked, not known and refused are three answers, and none of them a class. */
const NO_CLASS = new Set(["", "unknown", "refused"]);

function classesOf(values: readonly string[]): Attribute {
  const numbers = new Map<string, number>();
  const classOf = Int32Array.from(values, (value) => {
    if (NO_CLASS.has(value)) return MISSING_GROUP;
    const known = numbers.get(value) ?? numbers.size;
    numbers.set(value, known);
    return known;
  });
  return { values: [...numbers.keys()], classOf };
}

/**
 * Reads the pairs file and, when given, the people file into a network.
 *
 * Without a people file the people are the references of the pairs and the network is complete;
 * with one, every pair must name people of it, and the network is complete unless the file has a
 * column `interviewed`.
 *
 * @param attribute column of the people file to read as classes, or null
 */
export function readNetwork(
  pairs: Uint8Array,
  people: Uint8Array | null,
  attribute: string | null = null,
): ReadNetwork {
  const found: People = { numbers: new Map(), interviewed: [], dates: [], values: [] };
  const peopleTable = people ? readCsv(people, ["ref"]) : null;
  const peopleFaults = peopleTable ? readPeople(peopleTable, found, attribute) : [];
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
    refs: [...found.numbers.keys()],
    ends: {
      a: Int32Array.from(tellings, (telling) => telling.a),
      b: Int32Array.from(tellings, (telling) => telling.b),
    },
    isInterviewed,
    interviewOrder: isInterviewed ? interviewOrder(found) : new Int32Array(0),
    tellings: isInterviewed ? directedTellings(tellings) : { a: NOBODY, b: NOBODY },
    attribute:
      attribute !== null && peopleTable?.columns.has(attribute) ? classesOf(found.values) : null,
    doubleReports:
      isInterviewed && pairsTable.columns.has("named_by")
        ? countDoubleReports(tellings, isInterviewed)
        : null,
  };
  return { network, peopleFaults, pairsFaults };
}
