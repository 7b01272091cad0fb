import type { z } from "zod";
import type { Match, matchInput } from "../../../shared/contracts/people.ts";
import type { Tx } from "../../db/with-tx.ts";
import type { Actor } from "../../http/route.ts";
import type { KeyRing } from "../../identity/keys.ts";
import { lastTwo } from "../../identity/mask.ts";
import { findPeople, openPeople } from "../../identity/records.ts";
import { TOKEN_KINDS } from "../../identity/tokens.ts";
import { peopleById } from "./queries.ts";

const MOST = 6;
const REASONS = [
  [TOKEN_KINDS.phone, "phone"],
  [TOKEN_KINDS.namePart, "name"],
  [TOKEN_KINDS.nameSound, "sound"],
] as const;

/**
 * People already on record whom the acting person may see and whose telephone number or name meets
 * what is being typed; the ones met by telephone come first. What is out of scope is not hinted at.
 */
export async function matchPeople(
  tx: Tx,
  ring: KeyRing,
  actor: Actor,
  typed: z.output<typeof matchInput>,
  country: string,
): Promise<Match[]> {
  const keys = await ring.of(tx, actor.investigationId);
  const reasons = new Map<string, Set<Match["matchedOn"][number]>>();
  for (const text of [typed.phone, typed.name]) {
    if (!text || text.length < 2) continue;
    for (const found of await findPeople(tx, keys, text, country, MOST * 2)) {
      const known = reasons.get(found.personId) ?? new Set();
      for (const [kind, word] of REASONS) if (found.kinds.includes(kind)) known.add(word);
      // A name met whole also sounds alike; saying it once is enough.
      if (known.has("name")) known.delete("sound");
      reasons.set(found.personId, known);
    }
  }
  const ranked = [...reasons.entries()]
    .filter(([, why]) => why.size > 0)
    .sort(([, a], [, b]) => Number(b.has("phone")) - Number(a.has("phone")) || b.size - a.size)
    .slice(0, MOST);
  const people = await peopleById(
    tx,
    actor.role,
    ranked.map(([id]) => id),
  );
  const identity = await openPeople(
    tx,
    keys,
    people.map((one) => one.id),
    ["name", "phone"],
    "people.matched",
  );
  return ranked.flatMap(([id, why]) => {
    const person = people.find((one) => one.id === id);
    const known = identity.get(id);
    if (!person || !known) return [];
    return [
      {
        personId: id,
        studyNumber: person.studyNumber,
        name: known.name ?? null,
        phoneLast2: known.phone ? lastTwo(known.phone) : null,
        ageBand: (person.ageBand as string | null) ?? null,
        area: (person.area as string | null) ?? null,
        classification: person.classification,
        matchedOn: [...why],
      },
    ];
  });
}
