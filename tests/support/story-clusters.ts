import type { Outbreak } from "../../drizzle/seed/generator/types.ts";
import { dayNumber } from "../../shared/core/index.ts";
import {
  type ClusterSettings,
  groupCases,
  type ProposedCluster,
  type Stay,
} from "../../shared/group-cases.ts";

const DAY = /^\d{4}-\d{2}-\d{2}$/;

/** A proposed cluster of a story: people by their position, with first and last reference day. */
export interface StoryCluster extends ProposedCluster {
  people: number[];
  first: number;
  last: number;
}

/** Proposed clusters of an outbreak as generated, without a database. */
export function storyClusters(outbreak: Outbreak, settings: ClusterSettings): StoryCluster[] {
  const latest = new Map<number, string>();
  for (const row of outbreak.classifications) latest.set(row.personId, row.classification);
  const specimen = new Map<number, string>();
  for (const row of outbreak.tests) {
    if (row.result === "positive" && !specimen.has(row.personId)) {
      specimen.set(row.personId, row.specimenDate);
    }
  }
  const cases = outbreak.people.flatMap((person) => {
    if (!["confirmed", "probable"].includes(latest.get(person.id) ?? "")) return [];
    const onset = person.onsetDate && DAY.test(person.onsetDate) ? person.onsetDate : null;
    const day = dayNumber(onset ?? specimen.get(person.id) ?? "");
    if (day === null) return [];
    return [{ id: person.id, studyNumber: person.ref, day, basis: "onset" as const }];
  });
  const index = new Map(cases.map((one, at) => [one.id, at]));
  const links: [number, number][] = [];
  const stays: Stay[] = [];
  const stay = (id: number, place: number | null, from: string | null, until: string | null) => {
    const person = index.get(id);
    if (person === undefined || place === null || !from || !until) return;
    stays.push({ person, place, first: dayNumber(from) ?? 0, last: dayNumber(until) ?? 0 });
  };
  for (const row of outbreak.exposures) {
    if (row.withdrawnAt !== null) continue;
    const [a, b] = [index.get(row.personA), index.get(row.personB)];
    if (a !== undefined && b !== undefined) links.push([a, b]);
    stay(row.personA, row.placeId, row.firstDay, row.lastDay);
    stay(row.personB, row.placeId, row.firstDay, row.lastDay);
  }
  for (const row of outbreak.groupExposures) {
    const teller = outbreak.interviews[row.interviewId]?.personId ?? -1;
    stay(teller, row.placeId, row.firstDay, row.lastDay);
  }
  const settingOf = new Map(outbreak.places.map((place) => [place.id, place.setting]));
  return groupCases({ cases, links, stays, settingOf }, settings).map((cluster) => {
    const days = cluster.members.map((member) => cases[member]?.day ?? 0);
    return {
      ...cluster,
      people: cluster.members.map((member) => cases[member]?.id ?? -1),
      first: Math.min(...days),
      last: Math.max(...days),
    };
  });
}
