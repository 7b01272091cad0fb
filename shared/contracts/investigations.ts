import { z } from "zod";
import { ROLES } from "../roles.ts";
import { LIMITS, listOf, text, uuid } from "./common.ts";
import { SETTING_SHAPES, settingsPatch } from "./settings.ts";

const settings = SETTING_SHAPES;

export const investigationInput = z
  .strictObject({
    name: settings.name,
    /** Left out: as the account that opens it, invented for one of the demo. */
    invented: settings.invented.optional(),
    /** For learning: it is invented, filled with a small outbreak, and may be emptied. */
    practice: z.boolean({ error: "wrong_type" }).default(false),
    timeZone: settings.timeZone.default("UTC"),
    countryCode: settings.countryCode.default("GB"),
    caseDefinition: settings.caseDefinition.default(""),
    populationAtRisk: settings.populationAtRisk.default(null),
    infectiousBefore: settings.infectiousBefore.default(2),
    infectiousAfter: settings.infectiousAfter.default(10),
    incubationMin: settings.incubationMin.default(1),
    incubationMax: settings.incubationMax.default(14),
    monitoringDays: settings.monitoringDays.default(14),
  })
  .refine((input) => input.incubationMin <= input.incubationMax, {
    path: ["incubationMax"],
    error: "max_below_min",
  })
  .refine((input) => !input.practice || input.invented !== false, {
    path: ["invented"],
    error: "practice_is_invented",
  });
export type InvestigationInput = z.output<typeof investigationInput>;

/** Change of the settings that part of the report stands on. */
export const investigationPatch = settingsPatch.pick({
  version: true,
  name: true,
  populationAtRisk: true,
  infectiousBefore: true,
  infectiousAfter: true,
  monitoringDays: true,
});

export const investigationAnswer = z.strictObject({
  id: uuid,
  name: z.string(),
  invented: z.boolean(),
  practice: z.boolean(),
  timeZone: z.string(),
  countryCode: z.string(),
  today: z.string(),
  populationAtRisk: z.int().nullable(),
  infectiousBefore: z.int(),
  infectiousAfter: z.int(),
  incubationMin: z.int(),
  incubationMax: z.int(),
  monitoringDays: z.int(),
  caseDefinitionVersion: z.int(),
  graphVersion: z.int(),
  version: z.int(),
  roles: z.array(z.enum(ROLES)),
});
export type Investigation = z.output<typeof investigationAnswer>;
export const investigationList = listOf(investigationAnswer);

export const memberInput = z.strictObject({
  email: z.email({ error: "not_an_email" }).max(LIMITS.email, { error: "too_long" }),
  role: z.enum(ROLES, { error: "not_in_list" }),
  team: text(LIMITS.shortText).optional(),
});
/** Which membership ends: by its id, or the account's e-mail and the role it holds here. */
export const memberEndInput = z.union(
  [z.strictObject({ id: uuid }), memberInput.pick({ email: true, role: true })],
  { error: "invalid" },
);
export const memberAnswer = z.strictObject({
  id: uuid,
  accountId: uuid,
  displayName: z.string(),
  email: z.string(),
  role: z.enum(ROLES),
  team: z.string().nullable(),
  since: z.string(),
});
export type Member = z.output<typeof memberAnswer>;
export const memberList = listOf(memberAnswer);
