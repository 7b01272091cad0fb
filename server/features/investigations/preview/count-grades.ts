import { sql } from "drizzle-orm";
import type { ExposureGrading } from "../../../../shared/contracts/settings.ts";
import {
  EXPOSURE_GRADES,
  type ExposureGrade,
  gradeExposure,
} from "../../../../shared/exposure-grade.ts";
import type { Tx } from "../../../db/with-tx.ts";

type Columns = {
  pairs: number[] | null;
  settings: (string | null)[] | null;
  physical: (string | null)[] | null;
  minutes: (number | null)[] | null;
  distances: (number | null)[] | null;
};

/** What every live telling of a case's contact pairs says of the exposure, column by column. */
export type GradeColumns = Columns;

/** Reads what grades are counted on: pairs that a case (any certainty) is part of. */
export async function loadGradeColumns(tx: Tx, investigationId: string): Promise<GradeColumns> {
  const found = await tx.execute<Columns>(
    sql`with cases as materialized (
          select p.id from core.person p
          where p.investigation_id = ${investigationId} and p.withdrawn_at is null
            and p.classification in ('confirmed', 'probable', 'suspected')),
        pairs as materialized (
          select cp.id, (row_number() over () - 1)::int as n
          from core.contact_pair cp left join cases a on a.id = cp.person_a
          left join cases b on b.id = cp.person_b
          where cp.investigation_id = ${investigationId} and cp.withdrawn_at is null
            and (a.id is not null or b.id is not null))
        select json_agg(p.n) as pairs, json_agg(e.setting) as settings,
          json_agg(e.physical) as physical, json_agg(e.minutes) as minutes,
          json_agg(e.distance_m) as distances
        from pairs p join core.exposure e on e.pair_id = p.id
        where e.withdrawn_at is null`,
  );
  const none = { pairs: null, settings: null, physical: null, minutes: null, distances: null };
  return found.rows[0] ?? none;
}

/** Contact pairs by the grade of their gravest telling. */
export function countGrades(
  columns: GradeColumns,
  grading: ExposureGrading,
): Record<ExposureGrade, number> {
  const gravest = new Map<number, number>();
  for (const [at, pair] of (columns.pairs ?? []).entries()) {
    const { grade } = gradeExposure(
      {
        setting: columns.settings?.[at] ?? null,
        physical: columns.physical?.[at] ?? null,
        minutes: columns.minutes?.[at] ?? null,
        distanceM: columns.distances?.[at] ?? null,
      },
      grading,
    );
    const rank = EXPOSURE_GRADES.indexOf(grade);
    const known = gravest.get(pair);
    if (known === undefined || rank < known) gravest.set(pair, rank);
  }
  const counts: Record<ExposureGrade, number> = { high: 0, unknown: 0, low: 0 };
  for (const rank of gravest.values()) counts[EXPOSURE_GRADES[rank] ?? "unknown"] += 1;
  return counts;
}
