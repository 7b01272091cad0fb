import type { Outbreak } from "../../drizzle/seed/generator/types.ts";
import { PAIR_COLUMNS, PEOPLE_COLUMNS } from "../../shared/contracts/imports.ts";

type Cell = string | number | null | undefined;

function line(cells: readonly Cell[]): string {
  return cells
    .map((cell) => {
      const text = cell == null ? "" : String(cell);
      return /[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
    })
    .join(",");
}

/** References of their own, so that a file does not meet people of another generated outbreak. */
const refOf = (ref: string) => `F-${ref}`;

/**
 * Writes an outbreak as the two files an import takes.
 *
 * @param people rows of the people file, at most; pairs name only these
 * @param pairs rows of the pairs file, at most; one per contact pair
 */
export function importFiles(
  outbreak: Outbreak,
  people: number,
  pairs: number,
): { people: string; pairs: string; peopleRows: number; pairRows: number } {
  const classification = new Map(
    outbreak.classifications.map((entry) => [entry.personId, entry.classification]),
  );
  const test = new Map(outbreak.tests.map((entry) => [entry.personId, entry]));
  const interviewed = new Map(
    outbreak.interviews.flatMap((entry) =>
      entry.outcome === "complete" ? [[entry.personId, entry.at.slice(0, 10)] as const] : [],
    ),
  );
  const places = new Map(outbreak.places.map((place) => [place.id, place]));
  const peopleLines = [PEOPLE_COLUMNS.join(",")];
  for (const person of outbreak.people.slice(0, people)) {
    const sample = test.get(person.id);
    const household = places.get(person.householdPlaceId ?? -1);
    const cells: Record<(typeof PEOPLE_COLUMNS)[number], Cell> = {
      ref: refOf(person.ref),
      name: person.name,
      phone: person.phone,
      email: person.email,
      // A year alone is no day that a file may hold.
      birth_date: person.birthDate?.length === 4 ? null : person.birthDate,
      sex: person.sex,
      address: person.address,
      area: person.area,
      occupation: person.occupation,
      household: household?.name,
      classification: classification.get(person.id),
      onset_date: person.onsetDate,
      specimen_date: sample?.specimenDate,
      result_date: sample?.resultDate,
      result: sample?.result,
      report_date: person.reportDate,
      interview_date: interviewed.get(person.id),
      interviewed: interviewed.has(person.id) ? "yes" : null,
      isolation_date: person.isolationDate,
      died_date: person.outcome === "died" ? person.outcomeDate : null,
    };
    peopleLines.push(line(PEOPLE_COLUMNS.map((column) => cells[column])));
  }
  const pairLines = [PAIR_COLUMNS.join(",")];
  const seen = new Set<string>();
  for (const told of outbreak.exposures) {
    if (seen.size >= pairs) break;
    const [low, high] = [
      Math.min(told.personA, told.personB),
      Math.max(told.personA, told.personB),
    ];
    const key = `${low}|${high}`;
    const [a, b] = [outbreak.people[told.personA], outbreak.people[told.personB]];
    if (!a || !b || high >= people || told.withdrawnAt !== null || seen.has(key)) continue;
    seen.add(key);
    const place = places.get(told.placeId ?? -1);
    const cells: Record<(typeof PAIR_COLUMNS)[number], Cell> = {
      ref_a: refOf(a.ref),
      ref_b: refOf(b.ref),
      first_exposure: told.firstDay,
      last_exposure: told.lastDay,
      setting: told.setting,
      place: place?.name,
      minutes: told.minutes,
      distance_m: told.distanceM,
      named_by: refOf((told.namedBy === told.personA ? a : b).ref),
    };
    pairLines.push(line(PAIR_COLUMNS.map((column) => cells[column])));
  }
  return {
    people: peopleLines.join("\n"),
    pairs: pairLines.join("\n"),
    peopleRows: peopleLines.length - 1,
    pairRows: pairLines.length - 1,
  };
}
