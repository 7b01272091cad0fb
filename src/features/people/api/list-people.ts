import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { z } from "zod";
import type { Person } from "../../../../shared/contracts/people.ts";
import type { PeopleFilters } from "../../../../shared/contracts/people-filters.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** What the line list can be asked for, apart from the page. */
export type PeopleQuestion = { [K in keyof PeopleFilters]?: string | undefined } & {
  sort?: string | undefined;
  /** Name part, telephone, e-mail, reference or study number; always sent in a body. */
  q?: string | undefined;
};
export type PeopleAsk = PeopleQuestion & { page: number; pageSize: number };

/** The keys depend on the role; the server's contract has checked them on the way out. */
const list = z.object({
  items: z.array(z.custom<Person>((value) => typeof value === "object" && value !== null)),
  total: z.int(),
  page: z.int(),
  pageSize: z.int(),
});
export type PeopleList = z.output<typeof list>;

/** One page of the line list. Typed words travel in a body, coded filters in the address. */
export function peoplePageQuery(investigationId: string, ask: PeopleAsk) {
  const { q, area, ...coded } = ask;
  const words = Boolean(q || area);
  return queryOptions({
    queryKey: investigationKey(investigationId, "people", "list", ask),
    queryFn: ({ signal }) =>
      words
        ? api.post(inInvestigation(investigationId, "people/search"), {
            body: withoutBlanks(ask),
            schema: list,
            signal,
          })
        : api.get(inInvestigation(investigationId, "people"), {
            query: coded,
            schema: list,
            signal,
          }),
  });
}

/** The same, showing the page of the question before while the answer to a new one comes. */
export function peopleQuery(investigationId: string, ask: PeopleAsk) {
  return queryOptions({
    ...peoplePageQuery(investigationId, ask),
    placeholderData: keepPreviousData,
  });
}

/** What is asked, without what is not. */
export function withoutBlanks<T extends object>(ask: T): Partial<T> {
  return Object.fromEntries(
    Object.entries(ask).filter(([, value]) => value !== undefined && value !== ""),
  ) as Partial<T>;
}
