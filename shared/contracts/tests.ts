import { z } from "zod";
import { TEST_RESULTS } from "../vocabulary.ts";
import { choice, instant, LIMITS, listOf, optionalText, partialDay, uuid } from "./common.ts";

export const testInput = z
  .strictObject({
    specimenDate: partialDay,
    kind: optionalText(LIMITS.shortText),
    result: choice(TEST_RESULTS),
    resultDate: partialDay,
    resultAt: instant.nullable().default(null),
  })
  .refine(
    (test) =>
      !(test.specimenDate?.length === 10 && test.resultDate?.length === 10) ||
      test.resultDate >= test.specimenDate,
    { path: ["resultDate"], error: "result_before_specimen" },
  );
export type TestInput = z.output<typeof testInput>;

export const testAnswer = z.strictObject({
  id: uuid,
  specimenDate: z.string().nullable(),
  kind: z.string().nullable(),
  result: z.string().nullable(),
  resultDate: z.string().nullable(),
  resultAt: z.string().nullable(),
  recordedAt: z.string(),
  version: z.int(),
});
export type TestResult = z.output<typeof testAnswer>;
export const testList = listOf(testAnswer);
