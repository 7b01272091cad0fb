import { shiftDay } from "../../server/clock.ts";
import { LAST_DAY } from "./bench-database.ts";
import type { BenchClient } from "./http-client.ts";
import { spread } from "./http-client.ts";

/** What is measured of one kind of question. */
export type ListSpread = ReturnType<typeof spread>;

interface Listed {
  items: { name?: string | null; phone?: string | null }[];
  total: number;
}

/** Orders a line list is read in; recordedAt is its own. */
const SORTS = ["", "onsetDate", "-onsetDate", "-reportDate", "studyNumber", "classification"];

/** Filters as they stand in an address. */
const FILTERS = [
  "classification=case",
  "classification=contact&interviewed=no",
  `onsetFrom=${shiftDay(LAST_DAY, -19)}&onsetTo=${shiftDay(LAST_DAY, -6)}`,
  "interviewState=complete",
  "followUp=no",
  "needs=interview",
];

/** Pages spread over the whole of a list, as somebody jumping about in it asks for them. */
function jumps(total: number, pageSize: number, count: number): number[] {
  const last = Math.max(1, Math.ceil(total / pageSize));
  return Array.from({ length: count }, (_, index) =>
    Math.max(1, Math.round(((index * 0.618_034) % 1) * last)),
  );
}

async function pages(client: BenchClient, base: string, query: string, wanted: readonly number[]) {
  const times: number[] = [];
  for (const page of wanted) {
    times.push((await client.call("GET", `${base}/people?${query}&page=${page}`)).ms);
  }
  return times;
}

/** Words that are really there: name parts and telephone numbers of people the caller may name. */
async function wordsOf(client: BenchClient, base: string) {
  const found = await client.call<Listed>("GET", `${base}/people?pageSize=200&sort=studyNumber`);
  const names = found.body.items.flatMap((one) => one.name?.split(" ") ?? []);
  const phones = found.body.items.flatMap((one) => (one.phone ? [one.phone] : []));
  return {
    names: [...new Set(names.filter((part) => part.length > 2))].slice(0, 40),
    phones: [...new Set(phones.filter((phone) => /\d{5}/.test(phone.replace(/\D/g, ""))))].slice(
      0,
      40,
    ),
  };
}

async function searches(client: BenchClient, base: string, words: readonly string[]) {
  const times: number[] = [];
  for (const q of words) {
    times.push((await client.call("POST", `${base}/people/search`, { q })).ms);
  }
  return times;
}

/**
 * Times the line list over HTTP for each signed-in client, one request at a time: first pages and
 * pages anywhere in the list in several orders, filters, and searches by name part and by telephone
 * (only where the role may search by them). Nothing is changed.
 *
 * @param clients signed-in callers by the name their figures get
 * @param base address of the investigation, `/api/investigations/ID`
 * @returns milliseconds by caller and kind of question
 */
export async function benchLists(
  clients: Readonly<Record<string, BenchClient>>,
  base: string,
): Promise<Record<string, Record<string, ListSpread>>> {
  const results: Record<string, Record<string, ListSpread>> = {};
  for (const [who, client] of Object.entries(clients)) {
    const { body } = await client.call<Listed>("GET", `${base}/people?pageSize=50`);
    const first: number[] = [];
    const deep: number[] = [];
    const filtered: number[] = [];
    for (const sort of SORTS) {
      const query = `pageSize=50${sort && `&sort=${sort}`}`;
      first.push(...(await pages(client, base, query, [1, 2, 3, 4, 5, 6])));
      deep.push(...(await pages(client, base, query, jumps(body.total, 50, 6))));
    }
    for (const filter of FILTERS) {
      const query = `pageSize=50&sort=-onsetDate&${filter}`;
      filtered.push(...(await pages(client, base, query, [1, 2, 3, 4])));
    }
    const figures: Record<string, ListSpread> = {
      firstPagesMs: spread(first),
      anywhereMs: spread(deep),
      filteredMs: spread(filtered),
    };
    const { names, phones } = await wordsOf(client, base);
    if (names.length > 0) figures.nameSearchMs = spread(await searches(client, base, names));
    if (phones.length > 0) figures.phoneSearchMs = spread(await searches(client, base, phones));
    results[who] = figures;
  }
  return results;
}
