import { z } from "zod";
import { isGuessable } from "../passwords.ts";
import { ROLES } from "../roles.ts";
import { LIMITS, listOf, text, uuid } from "./common.ts";
import { roleEnd } from "./investigations.ts";

const address = z
  .email({ error: "not_an_email" })
  .max(LIMITS.email, { error: "too_long" })
  .transform((value) => value.toLowerCase());

/** A token as it stands in a link. */
const token = z.string({ error: "required" }).regex(/^[A-Za-z0-9_-]{43}$/, { error: "invalid" });

/** A password somebody chooses: 15 to 256 characters, none of the first ones tried. */
export const newPassword = z
  .string({ error: "required" })
  .min(LIMITS.passwordMin, { error: "too_short" })
  .max(LIMITS.passwordMax, { error: "too_long" })
  .refine((value) => value.isWellFormed(), { error: "not_text" })
  .refine((value) => value.length > LIMITS.passwordMax || !isGuessable(value), {
    error: "common_password",
  });

/** An invitation by e-mail into the acting investigation. */
export const invitationInput = z.strictObject({
  email: address,
  role: z.enum(ROLES, { error: "not_in_list" }),
  team: text(LIMITS.shortText).optional(),
  endsOn: roleEnd,
});

/** An invitation nobody took up yet. */
export const invitationAnswer = z.strictObject({
  id: uuid,
  email: z.string(),
  role: z.enum(ROLES),
  team: z.string().nullable(),
  invitedBy: z.string().nullable(),
  invitedAt: z.string(),
  endsOn: z.string().nullable(),
  expiresAt: z.string(),
});
export type Invitation = z.output<typeof invitationAnswer>;
export const invitationList = listOf(invitationAnswer);

export const tokenInput = z.strictObject({ token });

/** What the holder of an invitation may know before taking it up. */
export const invitationSeen = z.strictObject({
  email: z.string(),
  role: z.enum(ROLES),
  investigationName: z.string(),
  /** Last day of the role, when one is set. */
  endsOn: z.string().nullable(),
  invented: z.boolean(),
  /** There is an account with this e-mail; taking it up only adds the role. */
  hasAccount: z.boolean(),
});
export type InvitationSeen = z.output<typeof invitationSeen>;

/** Taking up an invitation; name and password are for a new account and otherwise left aside. */
export const acceptInput = z.strictObject({
  token,
  displayName: text(LIMITS.name, 1).optional(),
  password: newPassword.optional(),
});
export const acceptAnswer = z.strictObject({ accepted: z.literal(true), newAccount: z.boolean() });

export const resetRequest = z.strictObject({ email: address });
export const resetRequested = z.strictObject({ asked: z.literal(true) });
export const resetUse = z.strictObject({ token, password: newPassword });
export const resetUsed = z.strictObject({ changed: z.literal(true) });

export const passwordChange = z.strictObject({
  current: z
    .string({ error: "required" })
    .min(1, { error: "required" })
    .max(LIMITS.passwordMax, { error: "too_long" }),
  next: newPassword,
});

/** A letter in the inbox of an installation that sends no mail. */
export const letterAnswer = z.strictObject({
  id: z.int(),
  at: z.string(),
  to: z.string(),
  subject: z.string(),
  text: z.string(),
});
export type Letter = z.output<typeof letterAnswer>;
export const inboxAnswer = z.strictObject({ items: z.array(letterAnswer) });
