import { keepPreviousData, queryOptions } from "@tanstack/react-query";
import { z } from "zod";
import type { Person } from "../../../../shared/contracts/people.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

/** What the line list can be asked for. */
export interface PeopleAsk {
  page: number;
  pageSize: number;
  sort?: string | undefined;
  /** Name part, telephone, e-mail, reference or study number; always sent in a body. */
  q?: string | undefined;
  area?: string | undefined;
  classification?: string | undefined;
  interviewed?: string | undefined;
  assigned?: string | undefined;
  needs?: "interview" | undefined;
}

/** The keys depend on the role; the server's contract has checked them on the way out. */
const list = z.object({
  items: z.array(z.custom<Person>((value) => typeof value === "object" && value !== null)),
  total: z.int(),
  page: z.int(),
  pageSize: z.int(),
});
export type PeopleList = z.output<typeof list>;

/** One page of the line list. Typed words travel in a body, coded filters in the address. */
export function peopleQuery(investigationId: string, ask: PeopleAsk) {
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
    placeholderData: keepPreviousData,
  });
}

function withoutBlanks(ask: PeopleAsk): Partial<PeopleAsk> {
  return Object.fromEntries(
    Object.entries(ask).filter(([, value]) => value !== undefined && value !== ""),
  );
}
