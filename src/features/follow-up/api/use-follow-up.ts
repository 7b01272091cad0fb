import { keepPreviousData, useQuery } from "@tanstack/react-query";
import { type FollowShow, followUpList } from "../../../../shared/contracts/follow-up.ts";
import { api, inInvestigation } from "../../../lib/api-client.ts";
import { investigationKey } from "../../../lib/query-keys.ts";

export type FollowUpAsk = {
  show: FollowShow;
  /** A study number or its beginning; names never go into an address. */
  q: string;
  sort: string | undefined;
  page: number;
  pageSize: number;
};

/** One page of the contacts under follow-up; follows what other people enter. */
export function useFollowUp(investigationId: string, ask: FollowUpAsk) {
  return useQuery({
    queryKey: investigationKey(investigationId, "follow-up", ask),
    queryFn: ({ signal }) =>
      api.get(inInvestigation(investigationId, "follow-up"), {
        query: ask,
        schema: followUpList,
        signal,
      }),
    placeholderData: keepPreviousData,
  });
}
