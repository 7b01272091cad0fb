import { sql } from "drizzle-orm";
import type {
  SettingKey,
  SettingMeasure,
  SettingsPatch,
  SettingsPreview,
} from "../../../../shared/contracts/settings.ts";
import { dayIn, now } from "../../../clock.ts";
import type { Tx } from "../../../db/with-tx.ts";
import type { Actor } from "../../../http/route.ts";
import { loadClusterInput } from "../../clusters/store.ts";
import { type ChangeOfSettings, planChange, redefinesCases } from "../change-of-settings.ts";
import { loadSettings, type SettingsRow } from "../settings-store.ts";
import { countClasses, loadCaseFacts } from "./count-classes.ts";
import { countClusters } from "./count-clusters.ts";
import { countChecksOutside, countEntriesMoved } from "./count-entries.ts";
import { countFollowUps, loadContacts } from "./count-follow-ups.ts";
import { countGrades, loadGradeColumns } from "./count-grades.ts";
import { countInfectious, countSource, loadCaseDates } from "./count-windows.ts";

type Counts = Partial<Record<SettingMeasure, number>>;
/** Reads what its measures are counted on, once, and counts under both settings. */
type Counting = (
  tx: Tx,
  before: SettingsRow,
  after: SettingsRow,
) => Promise<{ before: Counts; after: Counts }>;

const todayOf = (settings: SettingsRow) => dayIn(settings.timeZone, now());

/** The same count under both. */
const both = <T>(count: (settings: SettingsRow) => T, before: SettingsRow, after: SettingsRow) => ({
  before: count(before),
  after: count(after),
});

const COUNTINGS = {
  infectious: async (tx, before, after) => {
    const cases = await loadCaseDates(tx, before.id);
    const pairs = await countInfectious(tx, before.id, cases, before, after);
    return {
      before: { pairs_in_window: pairs.before },
      after: { pairs_in_window: pairs.after },
    };
  },
  source: async (tx, before, after) => {
    const cases = await loadCaseDates(tx, before.id);
    const pairs = await countSource(tx, before.id, cases, before, after);
    return {
      before: { source_pairs_in_window: pairs.before },
      after: { source_pairs_in_window: pairs.after },
    };
  },
  followUps: async (tx, before, after) => {
    const today = todayOf(before);
    const days = [before.monitoringDays, after.monitoringDays];
    const monitoring = [Math.min(...days), Math.max(...days)] as const;
    const contacts = await loadContacts(tx, before, today, monitoring);
    const count = (settings: SettingsRow) => {
      const { due, ended, lost } = countFollowUps(contacts, settings, today);
      return { contacts_due_today: due, follow_ups_ended: ended, follow_ups_lost: lost };
    };
    return both(count, before, after);
  },
  clusters: async (tx, before, after) => {
    const { input } = await loadClusterInput(tx, before.id);
    const today = todayOf(before);
    const count = (settings: SettingsRow) => {
      const { proposed, cases, quiet } = countClusters(input, settings, today);
      return { proposed_clusters: proposed, cases_in_clusters: cases, clusters_quiet: quiet };
    };
    return both(count, before, after);
  },
  grades: async (tx, before, after) => {
    const columns = await loadGradeColumns(tx, before.id);
    const count = ({ exposureGrading }: SettingsRow) => {
      const { high, low, unknown } = countGrades(columns, exposureGrading);
      return { pairs_high_risk: high, pairs_low_risk: low, pairs_grade_unknown: unknown };
    };
    return both(count, before, after);
  },
  classes: async (tx, before, after) => {
    const people = await loadCaseFacts(tx, before.id);
    const count = ({ caseRules }: SettingsRow) => {
      const counts = countClasses(people, caseRules);
      return {
        cases_meeting_confirmed: counts.confirmed,
        cases_meeting_probable: counts.probable,
        cases_meeting_suspected: counts.suspected,
        classes_that_differ: counts.differ,
      };
    };
    return both(count, before, after);
  },
} as const satisfies Record<string, Counting>;
type CountingName = keyof typeof COUNTINGS;

/** What a setting can move: by which counting, and which of its measures. */
const MOVED: Partial<Record<SettingKey, readonly [CountingName, ...SettingMeasure[]][]>> = {
  infectiousBefore: [["infectious", "pairs_in_window"]],
  infectiousAfter: [["infectious", "pairs_in_window"]],
  incubationMin: [["source", "source_pairs_in_window"]],
  incubationMax: [
    ["source", "source_pairs_in_window"],
    ["clusters", "clusters_quiet"],
  ],
  monitoringDays: [["followUps", "contacts_due_today", "follow_ups_ended", "follow_ups_lost"]],
  lostAfterDays: [["followUps", "follow_ups_lost"]],
  clusterWindowDays: [["clusters", "proposed_clusters", "cases_in_clusters"]],
  clusterMinimumCases: [["clusters", "proposed_clusters", "cases_in_clusters"]],
  closureDays: [["clusters", "clusters_quiet"]],
  exposureGrading: [["grades", "pairs_high_risk", "pairs_low_risk", "pairs_grade_unknown"]],
  caseRules: [
    [
      "classes",
      "cases_meeting_confirmed",
      "cases_meeting_probable",
      "cases_meeting_suspected",
      "classes_that_differ",
    ],
  ],
};

type Move = SettingsPreview["moves"][number];

/** Measures that are counted in the database, before and after by themselves. */
async function countedThere(tx: Tx, change: ChangeOfSettings, key: SettingKey): Promise<Move[]> {
  const { before, after } = change;
  if (key === "symptoms") {
    return [
      {
        setting: key,
        measure: "checks_with_removed_symptoms",
        before: await countChecksOutside(tx, before.id, before.symptoms),
        after: await countChecksOutside(tx, before.id, after.symptoms),
      },
    ];
  }
  if (key !== "timeZone") return [];
  const moved = await countEntriesMoved(tx, before.id, before.timeZone, after.timeZone);
  return [{ setting: key, measure: "entries_on_another_day", before: 0, after: moved }];
}

/**
 * Lets this transaction read tables whole: everything is counted, so an index is the long way, but
 * the planner, who cannot see into functions, takes a hundred thousand contacts for a hundred. Who asks what a
 * change would move waits for it: on a busy machine it may take longer than other answers may.
 */
async function readWhole(tx: Tx): Promise<void> {
  await tx.execute(
    sql`select set_config('enable_nestloop', 'off', true), set_config('work_mem', '64MB', true),
      set_config('statement_timeout', '30s', true)`,
  );
}

/**
 * What a change of settings would move, counted on what is on record now with the functions that
 * the rooms use. All of the patch together makes "after"; each changed setting lists the measures
 * that it can move. Settings that stay, and those that move no count, have no line: of telephone
 * numbers only sealed forms are on record, which a change of the country leaves as they are, and
 * which cannot be told apart by country without opening every one.
 *
 * @throws HttpProblem as the change itself would
 */
export async function previewSettings(
  tx: Tx,
  actor: Actor,
  patch: SettingsPatch,
): Promise<SettingsPreview> {
  const current = await loadSettings(tx, actor.investigationId);
  const change = await planChange(tx, current, patch);
  const { before, after, changed } = change;
  await readWhole(tx);
  const counted = new Map<CountingName, { before: Counts; after: Counts }>();
  const moves: Move[] = [];
  for (const setting of changed) {
    for (const [name, ...measures] of MOVED[setting] ?? []) {
      // Where days to closure are set, the incubation does not move them.
      const fixed = setting === "incubationMax" && name === "clusters";
      if (fixed && before.closureDays !== null && after.closureDays !== null) continue;
      let counts = counted.get(name);
      if (!counts) {
        counts = await COUNTINGS[name](tx, before, after);
        counted.set(name, counts);
      }
      for (const measure of measures) {
        const [was, will] = [counts.before[measure], counts.after[measure]];
        if (was !== undefined && will !== undefined) {
          moves.push({ setting, measure, before: was, after: will });
        }
      }
    }
    moves.push(...(await countedThere(tx, change, setting)));
  }
  return { moves, newCaseDefinition: redefinesCases(changed) };
}
