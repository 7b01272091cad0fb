import { z } from "zod";
import { SETTINGS } from "../vocabulary.ts";
import { LIMITS, listOf, optionalText, text, uuid } from "./common.ts";

export const placeInput = z.strictObject({
  name: text(LIMITS.shortText, 1),
  setting: z.enum(SETTINGS, { error: "not_in_list" }),
  area: optionalText(LIMITS.shortText),
});
export type PlaceInput = z.output<typeof placeInput>;

/** A place; a household's `name` is present only for those who may open it, others see its number. */
export const placeAnswer = z.strictObject({
  id: uuid,
  number: z.int(),
  name: z.string().nullable(),
  setting: z.string().nullable(),
  area: z.string().nullable(),
  recordedAt: z.string(),
  version: z.int(),
});
export type Place = z.output<typeof placeAnswer>;
export const placeList = listOf(placeAnswer);
