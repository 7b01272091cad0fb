import type { LoadedGraph } from "./live-graph.ts";

/** Person number that a group id stands for; undefined when no group or person has it. */
export function founderOf(graph: LoadedGraph, group: string): number | undefined {
  const live = graph.groups.list().find(({ id }) => id === group);
  return live?.founder ?? graph.store.indexOf(group);
}

/** Founder of each person's live group (-1 without one), and the ids of groups by founder. */
export function groupNames(graph: LoadedGraph) {
  const founders = new Int32Array(graph.store.people.length).fill(-1);
  const ids = new Map<number, string>();
  for (let person = 0; person < founders.length; person++) {
    const group = graph.groups.groupOf(person);
    if (!group) continue;
    founders[person] = group.founder;
    ids.set(group.founder, group.id);
  }
  return { founders, ids };
}
