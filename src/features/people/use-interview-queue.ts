import { useQuery } from "@tanstack/react-query";
import type { Person } from "../../../shared/contracts/people.ts";
import { type PeopleAsk, peopleQuery } from "./api/list-people.ts";

const ask: PeopleAsk = { page: 1, pageSize: 50, needs: "interview", sort: "recordedAt" };

export interface QueueRow {
  person: Person;
  mine: boolean;
}

/** Mine first, each part longest waiting first; nobody twice. */
export function orderQueue(mine: readonly Person[], all: readonly Person[], accountId: string) {
  const own = new Map(mine.map((person) => [person.id, person]));
  for (const person of all) if (person.assignedTo === accountId) own.set(person.id, person);
  return [
    ...[...own.values()].map((person): QueueRow => ({ person, mine: true })),
    ...all
      .filter((person) => !own.has(person.id))
      .map((person): QueueRow => ({ person, mine: false })),
  ];
}

/**
 * Cases that wait for an interview. Who they are assigned to is only asked about where the answers
 * say so at all.
 */
export function useInterviewQueue(investigationId: string, accountId: string) {
  const all = useQuery(peopleQuery(investigationId, ask));
  const knowsAssignment = all.data?.items.some((person) => "assignedTo" in person) ?? false;
  const mine = useQuery({
    ...peopleQuery(investigationId, { ...ask, assigned: "me" }),
    enabled: knowsAssignment,
  });
  const rows = orderQueue(mine.data?.items ?? [], all.data?.items ?? [], accountId);
  return {
    rows: rows.filter(({ person }) => person.can.interview),
    total: all.data?.total ?? 0,
    isPending: all.isPending || (knowsAssignment && mine.isPending),
    error: all.error ?? mine.error,
    refetch: () => {
      void all.refetch();
      if (knowsAssignment) void mine.refetch();
    },
  };
}
