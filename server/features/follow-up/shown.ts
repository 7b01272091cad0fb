import { type SQL, sql } from "drizzle-orm";
import type { z } from "zod";
import type { followUpQuery } from "../../../shared/contracts/follow-up.ts";
import { shiftDay } from "../../clock.ts";

/** What is asked of the list of contacts under follow-up. */
export interface ListQuestion {
  show: z.output<typeof followUpQuery>["show"];
  /** Local day in the investigation's zone. */
  today: string;
  monitoringDays: number;
  investigationId: string;
  down: boolean;
  limit: number;
  offset: number;
}

/** Stands for "no day 0" where rows are put in order: after every day. */
export const NO_DAY = sql.raw("99991231");

/** Day 0 of a row of `core.follow_up` as a number, YYYYMMDD. */
export const dayKey = (alias: string): SQL => sql.raw(`${alias}.day_key`);

const keyOf = (day: string): number => Number(day.replaceAll("-", ""));

/** Days 0 of those due today, first and last, as numbers. */
export function dueKeys({ today, monitoringDays }: ListQuestion): readonly [number, number] {
  return [keyOf(shiftDay(today, -monitoringDays)), keyOf(shiftDay(today, -1))];
}

/**
 * Which rows a list shows by their days alone: contacts whose day today is 1 … M; all with a day 0;
 * those past day M, or whose follow-up ended otherwise; those without a day 0.
 */
export function inDays(alias: string, question: ListQuestion): SQL {
  const { show } = question;
  const key = dayKey(alias);
  const open = sql.raw(`${alias}.open`);
  const [first, last] = dueKeys(question).map((day) => sql`${day}::integer`) as [SQL, SQL];
  if (show === "due") return sql`${open} and ${key} between ${first} and ${last}`;
  if (show === "ended") return sql`(${key} < ${first} or not ${open})`;
  if (show === "without_day_zero") return sql`${open} and ${key} = ${NO_DAY}`;
  return sql`${key} < ${NO_DAY}`;
}

/**
 * Which rows a list shows. Somebody who reported symptoms stays among those due, whichever day it
 * is and also without a day 0, until a later day says otherwise.
 */
export function isShown(alias: string, question: ListQuestion): SQL {
  const days = inDays(alias, question);
  if (question.show !== "due") return days;
  return sql`(${days} or ${sql.raw(`${alias}.open and ${alias}.symptomatic`)})`;
}
