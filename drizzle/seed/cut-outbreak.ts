import type { Outbreak } from "./generator/types.ts";

/** People round the first cases, nearest first: neighbours of neighbours until there are enough. */
function peopleRound(outbreak: Outbreak, count: number): number[] {
  const neighbours = new Map<number, number[]>();
  for (const { personA, personB } of outbreak.exposures) {
    for (const [one, other] of [
      [personA, personB],
      [personB, personA],
    ] as const) {
      const known = neighbours.get(one);
      if (known) known.push(other);
      else neighbours.set(one, [other]);
    }
  }
  const kept = new Set<number>();
  const starts = outbreak.people.filter((person) => person.reportDate !== null);
  for (const { id } of [...starts, ...outbreak.people]) {
    const queue = [id];
    for (let next = queue.shift(); next !== undefined; next = queue.shift()) {
      if (kept.size >= count) return [...kept].sort((a, b) => a - b);
      if (kept.has(next)) continue;
      kept.add(next);
      queue.push(...(neighbours.get(next) ?? []));
    }
  }
  return [...kept].sort((a, b) => a - b);
}

/**
 * A part of an outbreak: about as many people as asked for, who belong together, with everything
 * recorded of them and between them. Pure. The story is that of the whole.
 */
export function cutOutbreak(outbreak: Outbreak, count: number): Outbreak {
  const people = peopleRound(outbreak, count);
  const personAt = new Map(people.map((id, at) => [id, at]));
  const interviews = outbreak.interviews.filter((one) => personAt.has(one.personId));
  const interviewAt = new Map(interviews.map((one, at) => [one.id, at]));
  const exposures = outbreak.exposures.filter(
    (one) =>
      personAt.has(one.personA) &&
      personAt.has(one.personB) &&
      (one.interviewId === null || interviewAt.has(one.interviewId)),
  );
  const groups = outbreak.groupExposures.filter((one) => interviewAt.has(one.interviewId));
  const used = new Set<number | null>([
    ...exposures.map((one) => one.placeId),
    ...groups.map((one) => one.placeId),
    ...people.map((id) => outbreak.people[id]?.householdPlaceId ?? null),
  ]);
  const places = outbreak.places.filter((place) => used.has(place.id));
  const placeAt = new Map(places.map((place, at) => [place.id, at]));
  const place = (id: number | null) => (id === null ? null : (placeAt.get(id) ?? null));
  const person = (id: number) => personAt.get(id) ?? 0;
  const interview = (id: number) => interviewAt.get(id) ?? 0;
  const of = <T extends { personId: number }>(rows: readonly T[]) =>
    rows
      .filter((row) => personAt.has(row.personId))
      .map((row) => ({ ...row, personId: person(row.personId) }));
  return {
    ...outbreak,
    places: places.map((one, at) => ({ ...one, id: at })),
    people: people.flatMap((id, at) => {
      const one = outbreak.people[id];
      if (!one) return [];
      const duplicateOf = one.duplicateOf === null ? null : (personAt.get(one.duplicateOf) ?? null);
      return [{ ...one, id: at, duplicateOf, householdPlaceId: place(one.householdPlaceId) }];
    }),
    classifications: of(outbreak.classifications),
    tests: of(outbreak.tests),
    checks: of(outbreak.checks),
    interviews: of(interviews).map((one, at) => ({ ...one, id: at })),
    exposures: exposures.map((one) => ({
      ...one,
      interviewId: one.interviewId === null ? null : interview(one.interviewId),
      personA: person(one.personA),
      personB: person(one.personB),
      namedBy: person(one.namedBy),
      placeId: place(one.placeId),
    })),
    groupExposures: groups.map((one) => ({
      ...one,
      interviewId: interview(one.interviewId),
      placeId: place(one.placeId),
    })),
  };
}
