import { sql } from "drizzle-orm";
import { type CaseFacts, classByRules } from "../../../../shared/class-by-rules.ts";
import type { CaseRules } from "../../../../shared/contracts/settings.ts";
import { isCase } from "../../../../shared/vocabulary.ts";
import type { Tx } from "../../../db/with-tx.ts";

/** People of one recorded class with the same facts, and how many they are. */
export interface AlikePeople extends CaseFacts {
  classification: string | null;
  count: number;
}

/**
 * People on record by their class and by what the rules of a case definition ask for. People who
 * were found to be no case are left out: somebody decided that on other grounds.
 */
export async function loadCaseFacts(tx: Tx, investigationId: string): Promise<AlikePeople[]> {
  const found = await tx.execute<AlikePeople & Record<string, unknown>>(
    sql`with cases as materialized (
          select p.id from core.person p
          where p.investigation_id = ${investigationId} and p.withdrawn_at is null
            and p.classification in ('confirmed', 'probable')),
        live as materialized (
          select cp.person_a, cp.person_b from core.contact_pair cp
          where cp.investigation_id = ${investigationId} and cp.withdrawn_at is null
            and exists (select 1 from core.exposure e
              where e.pair_id = cp.id and e.withdrawn_at is null)),
        linked as materialized (
          select l.person_b as id from live l join cases c on c.id = l.person_a
          union
          select l.person_a from live l join cases c on c.id = l.person_b),
        positive as materialized (
          select distinct t.person_id as id from core.test_result t
          where t.investigation_id = ${investigationId} and t.result = 'positive'
            and t.withdrawn_at is null)
        select p.classification, t.id is not null as laboratory,
          coalesce(p.onset_date, 'unknown') not in ('unknown', 'refused') as clinical,
          l.id is not null as link, count(*)::int as count
        from core.person p left join positive t on t.id = p.id left join linked l on l.id = p.id
        where p.investigation_id = ${investigationId} and p.withdrawn_at is null
          and p.classification is distinct from 'not_a_case'
        group by 1, 2, 3, 4`,
  );
  return found.rows;
}

/** How many meet each class by the rules, and how many are on record as another. */
export function countClasses(people: readonly AlikePeople[], rules: CaseRules) {
  const counts = { confirmed: 0, probable: 0, suspected: 0, differ: 0 };
  for (const { classification, count, ...facts } of people) {
    const met = classByRules(facts, rules);
    if (met) counts[met] += count;
    // A contact and somebody not yet classified are alike: no case.
    if (met !== (isCase(classification) ? classification : null)) counts.differ += count;
  }
  return counts;
}
