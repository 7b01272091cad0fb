import type { NetworkGraph } from "../../shared/contracts/network.ts";
import { type Components, components } from "../../shared/core/index.ts";
import { dayRange } from "./answer-report.ts";
import type { GraphSnapshot } from "./graph-store.ts";
import { layOut } from "./lay-out.ts";
import { packGroups, sideOf } from "./pack-groups.ts";
import type { ReportQuestion } from "./report-question.ts";
import {
  casesOf,
  classifiedAt,
  flagsOf,
  interviewedAt,
  narrow,
  select,
  tellingsAt,
} from "./selection.ts";

/** Above this many people groups are drawn instead of people. */
export const MOST_PEOPLE_DRAWN = 1_500;
/** At most this many groups are drawn, the largest. */
export const MOST_GROUPS_DRAWN = 1_500;

export type PictureQuestion = {
  readonly report: ReportQuestion;
  /** Narrow to the group of this person (number in the snapshot), or null. */
  readonly groupOf: number | null;
  /** Founder (person number) of each person's live group, -1 without one; null = work it out. */
  readonly founders: Int32Array | null;
};

/** A drawn person or group, by the number of the person (its founder, for a group). */
export type DrawnNode = {
  readonly person: number;
  readonly founder: number;
  readonly rank: number;
  readonly size: number;
  readonly code: number;
  readonly x: number;
  readonly y: number;
};

export type PictureAnswer = {
  readonly level: NetworkGraph["level"];
  readonly nodes: readonly DrawnNode[];
  /** Pair number, and positions of its ends in `nodes`. */
  readonly pairs: readonly { readonly pair: number; readonly a: number; readonly b: number }[];
};

/** Founder of each person's group at a past cut-off: its person entered first. */
function foundersThen(snapshot: GraphSnapshot, asOf: number | null): Int32Array {
  const { graph, original } = select(snapshot, asOf, null);
  const { component } = components(graph);
  const founders = new Int32Array(snapshot.people.recordedAt.length).fill(-1);
  const firstOf = new Map<number, number>();
  original.forEach((person, u) => {
    const label = component[u] as number;
    if (!firstOf.has(label)) firstOf.set(label, person);
    founders[person] = firstOf.get(label) as number;
  });
  return founders;
}

/** Sizes and ranks of the groups among drawn people: largest first, then by founder. */
function rankGroups(founders: readonly number[]) {
  const sizes = new Map<number, number>();
  for (const founder of founders) sizes.set(founder, (sizes.get(founder) ?? 0) + 1);
  const order = [...sizes].sort((x, y) => y[1] - x[1] || x[0] - y[0]);
  return { order, ranks: new Map(order.map(([founder], rank) => [founder, rank])) };
}

/** People of each component, by label. */
function peopleByComponent({ component, sizes }: Components): number[][] {
  const lists: number[][] = Array.from(sizes, () => []);
  component.forEach((label, u) => {
    lists[label]?.push(u);
  });
  return lists;
}

/**
 * The network as positions: people up to `MOST_PEOPLE_DRAWN`, above that one disc per group of two
 * or more. Positions depend on the drawn graph alone: the same record gives the same picture.
 */
export function answerPicture(snapshot: GraphSnapshot, question: PictureQuestion): PictureAnswer {
  const { report } = question;
  const { dated } = tellingsAt(snapshot, report.asOf ?? Number.MAX_VALUE);
  const range = dayRange(report, report.lastDay, dated);
  const founders = question.founders ?? foundersThen(snapshot, report.asOf);
  const founderOf = (person: number) => {
    const founder = founders[person] as number;
    return founder < 0 ? person : founder;
  };
  const codes = classifiedAt(snapshot, report.asOf);
  const wanted = peopleWanted(snapshot, question, codes, founderOf);
  const everyone = select(snapshot, report.asOf, range);
  const drawn = narrow(everyone, flagsOf(everyone, wanted));
  const { order, ranks } = rankGroups(Array.from(drawn.original, founderOf));

  if (drawn.graph.n > MOST_PEOPLE_DRAWN) {
    const groups = order.filter(([, size]) => size > 1).slice(0, MOST_GROUPS_DRAWN);
    const places = packGroups(groups.map(([, size]) => sideOf(size)));
    const nodes = groups.map(([founder, size], rank) => ({
      person: founder,
      founder,
      rank,
      size,
      code: 0,
      x: places[rank]?.x ?? 0,
      y: places[rank]?.y ?? 0,
    }));
    return { level: "groups", nodes, pairs: [] };
  }

  const x = new Float64Array(drawn.graph.n);
  const y = new Float64Array(drawn.graph.n);
  const parts = peopleByComponent(components(drawn.graph));
  const places = packGroups(parts.map((people) => sideOf(people.length)));
  parts.forEach((people, label) => {
    const positions = layOut(drawn.graph, people);
    people.forEach((u, k) => {
      x[u] = (places[label]?.x ?? 0) + (positions[k]?.x ?? 0);
      y[u] = (places[label]?.y ?? 0) + (positions[k]?.y ?? 0);
    });
  });
  const nodes = Array.from(drawn.original, (person, u) => ({
    person,
    founder: founderOf(person),
    rank: ranks.get(founderOf(person)) ?? 0,
    size: 1,
    code: codes[person] as number,
    x: x[u] as number,
    y: y[u] as number,
  }));
  const pairs = Array.from(drawn.pair, (pair, k) => ({
    pair,
    a: drawn.a[k] as number,
    b: drawn.b[k] as number,
  }));
  return { level: "people", nodes, pairs };
}

/** Flags of the people to be drawn: of the population, and of one group when asked for. */
function peopleWanted(
  snapshot: GraphSnapshot,
  { report, groupOf }: PictureQuestion,
  codes: Uint8Array,
  founderOf: (person: number) => number,
): Uint8Array {
  const wanted =
    report.population === "cases"
      ? casesOf(codes)
      : report.population === "interviewed"
        ? Uint8Array.from(interviewedAt(snapshot, report.asOf ?? Number.MAX_VALUE).flags)
        : new Uint8Array(codes.length).fill(1);
  if (groupOf === null) return wanted;
  const founder = founderOf(groupOf);
  return wanted.map((flag, person) => (flag === 1 && founderOf(person) === founder ? 1 : 0));
}
