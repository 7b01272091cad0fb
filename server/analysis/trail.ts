import { possiblePairs } from "../../shared/core/index.ts";
import type { GraphSnapshot } from "./graph-store.ts";
import type { CutOff, ReportQuestion } from "./report-question.ts";
import {
  casesOf,
  classifiedAt,
  type DayRange,
  interviewedAt,
  meets,
  onRecord,
} from "./selection.ts";

/** One day of the trail: the threshold figure as it stood at the end of that day. */
export type TrailPoint = { readonly day: string; readonly pairsPerPerson: number | null };

/** People of the population at an instant, and which of them count as interviewed. */
function peopleAt(
  snapshot: GraphSnapshot,
  question: ReportQuestion,
  at: number,
  complete: boolean,
) {
  const people = onRecord(snapshot, at);
  if (question.population === "cases") {
    const cases = casesOf(classifiedAt(snapshot, at));
    for (let k = 0; k < people.length; k++)
      people[k] = (people[k] as number) & (cases[k] as number);
  }
  const interviewed = complete ? people : interviewedAt(snapshot, at).flags;
  let n = 0;
  let i = 0;
  for (let k = 0; k < people.length; k++) {
    if (people[k] === 0) continue;
    n++;
    if (interviewed[k] === 1) i++;
  }
  return { people, interviewed, n, i };
}

/**
 * The threshold figure c_e of the same question at earlier cut-offs. What was known then is read
 * from the two clocks of the record, so a past day keeps its value unless older entries are loaded
 * later.
 *
 * @param rangeAt exposure days that count at a cut-off
 * @param complete the network is taken as complete
 *
 * Cost: one pass over people, interviews and tellings per day. Source: methods, box of C.8.
 */
export function trail(
  snapshot: GraphSnapshot,
  question: ReportQuestion,
  cutOffs: readonly CutOff[],
  rangeAt: (cutOff: CutOff) => DayRange,
  complete: boolean,
): TrailPoint[] {
  const { a, b } = snapshot.pairs;
  const { pair, firstDay, lastDay, recordedAt, withdrawnAt } = snapshot.exposures;
  const metOn = new Uint8Array(a.length);
  return cutOffs.map((cutOff, turn) => {
    const { people, interviewed, n, i } = peopleAt(snapshot, question, cutOff.at, complete);
    const range = rangeAt(cutOff);
    const stamp = turn + 1;
    let pairs = 0;
    for (let k = 0; k < pair.length; k++) {
      if ((recordedAt[k] as number) > cutOff.at || (withdrawnAt[k] as number) <= cutOff.at)
        continue;
      const p = pair[k] as number;
      if (metOn[p] === stamp) continue;
      if (!meets(firstDay[k] as number, lastDay[k] as number, range)) continue;
      const u = a[p] as number;
      const v = b[p] as number;
      if (people[u] === 0 || people[v] === 0) continue;
      if (interviewed[u] === 0 && interviewed[v] === 0) continue;
      metOn[p] = stamp;
      pairs++;
    }
    const declared = question.population === "cases" ? 0 : (question.declaredPopulation ?? 0);
    const all = Math.max(n, declared);
    const told = complete ? all : i;
    const eligible = possiblePairs(told) + told * (all - told);
    return {
      day: cutOff.day,
      pairsPerPerson: eligible > 0 ? ((all - 1) * pairs) / eligible : null,
    };
  });
}
