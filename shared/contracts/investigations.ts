import { z } from "zod";
import { ROLES } from "../roles.ts";
import { LIMITS, listOf, rowVersion, text, uuid } from "./common.ts";
import { isTimeZone } from "./settings.ts";

const whole = (min: number, max: number) =>
  z
    .number({ error: "not_a_number" })
    .int({ error: "not_a_whole_number" })
    .min(min, { error: "too_small" })
    .max(max, { error: "too_big" });

const timeZone = z
  .string({ error: "required" })
  .max(64, { error: "too_long" })
  .refine(isTimeZone, { error: "not_a_zone" });

const settings = {
  populationAtRisk: whole(1, 100_000_000).nullable(),
  infectiousBefore: whole(0, 60),
  infectiousAfter: whole(1, 120),
  incubationMin: whole(0, 120),
  incubationMax: whole(1, 365),
  monitoringDays: whole(1, 120),
};

export const investigationInput = z.strictObject({
  name: text(LIMITS.name, 1),
  /** Left out: as the account that opens it, invented for one of the demo. */
  invented: z.boolean({ error: "wrong_type" }).optional(),
  /** To learn with: always invented, may be emptied, sends nothing, counts nowhere. */
  practice: z.boolean({ error: "wrong_type" }).default(false),
  timeZone: timeZone.default("UTC"),
  countryCode: z
    .string()
    .regex(/^[A-Z]{2}$/, { error: "invalid" })
    .default("GB"),
  caseDefinition: text(LIMITS.note).default(""),
  populationAtRisk: settings.populationAtRisk.default(null),
  infectiousBefore: settings.infectiousBefore.default(2),
  infectiousAfter: settings.infectiousAfter.default(10),
  incubationMin: settings.incubationMin.default(1),
  incubationMax: settings.incubationMax.default(14),
  monitoringDays: settings.monitoringDays.default(14),
});
export type InvestigationInput = z.output<typeof investigationInput>;

/** Change of the settings that part of the report stands on. */
export const investigationPatch = z.strictObject({
  version: rowVersion,
  name: text(LIMITS.name, 1).optional(),
  populationAtRisk: settings.populationAtRisk.optional(),
  infectiousBefore: settings.infectiousBefore.optional(),
  infectiousAfter: settings.infectiousAfter.optional(),
  monitoringDays: settings.monitoringDays.optional(),
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
