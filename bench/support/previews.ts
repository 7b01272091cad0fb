import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  DEFAULT_SYMPTOMS,
  type Settings,
} from "../../shared/contracts/settings.ts";
import { type BenchClient, spread } from "./http-client.ts";

const TURNS = 3;

/** A change of each setting that has something to count; the outbreak's own settings differ. */
const CHANGES: Partial<Settings> = {
  infectiousBefore: 3,
  infectiousAfter: 9,
  incubationMin: 1,
  incubationMax: 12,
  monitoringDays: 21,
  lostAfterDays: 5,
  clusterWindowDays: 10,
  clusterMinimumCases: 4,
  closureDays: 28,
  exposureGrading: { ...DEFAULT_EXPOSURE_GRADING, highMinutes: 60 },
  caseRules: {
    ...DEFAULT_CASE_RULES,
    confirmed: { laboratory: true, clinical: true, link: false },
  },
  symptoms: DEFAULT_SYMPTOMS.slice(1),
  timeZone: "Pacific/Auckland",
};

/**
 * Times previews of settings over HTTP, one setting at a time; nothing is stored.
 *
 * @param base address of the investigation, `/api/investigations/<id>`
 * @returns median, 95th percentile and most in ms by setting, and of one change of all of them
 */
export async function benchPreviews(
  supervisor: BenchClient,
  base: string,
): Promise<Record<string, ReturnType<typeof spread>>> {
  const { body } = await supervisor.call<Settings>("GET", `${base}/settings`);
  const out: Record<string, ReturnType<typeof spread>> = {};
  const changes = [
    ...Object.entries(CHANGES).map(([setting, value]) => [setting, { [setting]: value }] as const),
    ["all together", CHANGES] as const,
  ];
  for (const [name, change] of changes) {
    const times: number[] = [];
    for (let turn = 0; turn < TURNS; turn += 1) {
      const sent = { version: body.version, ...change };
      times.push((await supervisor.call("POST", `${base}/settings/preview`, sent)).ms);
    }
    out[name] = spread(times);
  }
  return out;
}
