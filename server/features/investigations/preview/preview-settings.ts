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
import { countInfectious, countSource, loadCaseTellings } from "./count-windows.ts";

type Counts = Partial<Record<SettingMeasure, number>>;
/** Reads what its measures are counted on, once; the result counts under any settings. */
type Counting = (tx: Tx, settings: SettingsRow) => Promise<(under: SettingsRow) => Counts>;

const todayOf = (settings: SettingsRow) => dayIn(settings.timeZone, now());

const COUNTINGS = {
  infectious: async (tx, { id }) => {
    const tellings = await loadCaseTellings(tx, id);
    return (under) => ({ pairs_in_window: countInfectious(tellings, under) });
  },
  source: async (tx, { id }) => {
    const tellings = await loadCaseTellings(tx, id);
    return (under) => ({ source_pairs_in_window: countSource(tellings, under) });
  },
  followUps: async (tx, settings) => {
    const contacts = await loadContacts(tx, settings);
    const today = todayOf(settings);
    return (under) => {
      const { due, ended, lost } = countFollowUps(contacts, under, today);
      return { contacts_due_today: due, follow_ups_ended: ended, follow_ups_lost: lost };
    };
  },
  clusters: async (tx, settings) => {
    const { input } = await loadClusterInput(tx, settings.id);
    const today = todayOf(settings);
    return (under) => {
      const { proposed, cases, quiet } = countClusters(input, under, today);
      return { proposed_clusters: proposed, cases_in_clusters: cases, clusters_quiet: quiet };
    };
  },
  grades: async (tx, { id }) => {
    const columns = await loadGradeColumns(tx, id);
    return (under) => {
      const { high, low, unknown } = countGrades(columns, under.exposureGrading);
      return { pairs_high_risk: high, pairs_low_risk: low, pairs_grade_unknown: unknown };
    };
  },
  classes: async (tx, { id }) => {
    const people = await loadCaseFacts(tx, id);
    return (under) => {
      const counts = countClasses(people, under.caseRules);
      return {
        cases_meeting_confirmed: counts.confirmed,
        cases_meeting_probable: counts.probable,
        cases_meeting_suspected: counts.suspected,
        classes_that_differ: counts.differ,
      };
    };
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
  const counted = new Map<CountingName, { before: Counts; after: Counts }>();
  const moves: Move[] = [];
  for (const setting of changed) {
    for (const [name, ...measures] of MOVED[setting] ?? []) {
      // Where days to closure are set, the incubation does not move them.
      const fixed = setting === "incubationMax" && name === "clusters";
      if (fixed && before.closureDays !== null && after.closureDays !== null) continue;
      let counts = counted.get(name);
      if (!counts) {
        const under = await COUNTINGS[name](tx, before);
        counts = { before: under(before), after: under(after) };
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
