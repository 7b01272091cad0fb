import { z } from "zod";
import { ROLES, ROOMS } from "../roles.ts";
import { newPassword } from "./accounts.ts";
import { LIMITS, uuid } from "./common.ts";

/** What a visitor may know before signing in. */
export const welcomeAnswer = z.strictObject({
  signedIn: z.boolean(),
  demo: z.boolean(),
  setUpNeeded: z.boolean(),
  /** Where mail goes: to a server, to the inbox of this installation, nowhere. */
  mail: z.enum(["smtp", "inbox", "off"]).default("off"),
});

export const signInInput = z.strictObject({
  email: z
    .string({ error: "required" })
    .min(1, { error: "required" })
    .max(LIMITS.email, { error: "too_long" }),
  password: z
    .string({ error: "required" })
    .min(1, { error: "required" })
    .max(LIMITS.passwordMax, { error: "too_long" }),
});
export type SignInInput = z.output<typeof signInInput>;

/** The password once more, for what asks for it anew. */
export const confirmInput = signInInput.pick({ password: true });
export const confirmAnswer = z.strictObject({ confirmedUntil: z.string() });

export const switchInput = z.strictObject({
  actingRole: z.enum(ROLES, { error: "not_in_list" }),
  investigationId: uuid,
});

export const membershipAnswer = z.strictObject({
  investigationId: uuid,
  investigationName: z.string(),
  invented: z.boolean(),
  role: z.enum(ROLES),
});

/** The signed-in session: who, acting as what, in which investigation, until when. */
export const sessionAnswer = z.strictObject({
  accountId: uuid,
  displayName: z.string(),
  email: z.string(),
  demo: z.boolean(),
  actingRole: z.enum(ROLES).nullable(),
  investigationId: uuid.nullable(),
  rooms: z.array(z.enum(ROOMS)),
  memberships: z.array(membershipAnswer),
  idleMinutes: z.number(),
  endsAt: z.string(),
});
export type Session = z.output<typeof sessionAnswer>;

/** First officer of an empty installation; the token travels in the body, never in an address. */
export const firstOfficerInput = z.strictObject({
  token: z
    .string({ error: "required" })
    .min(20, { error: "invalid" })
    .max(200, { error: "invalid" }),
  displayName: z
    .string({ error: "required" })
    .trim()
    .min(1, { error: "required" })
    .max(LIMITS.name, { error: "too_long" }),
  email: z.email({ error: "not_an_email" }).max(LIMITS.email, { error: "too_long" }),
  password: newPassword,
  investigationName: z
    .string({ error: "required" })
    .trim()
    .min(1, { error: "required" })
    .max(LIMITS.name, { error: "too_long" }),
  timeZone: z.string({ error: "required" }).min(1).max(64),
});
