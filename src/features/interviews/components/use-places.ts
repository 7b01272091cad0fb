import { useQuery } from "@tanstack/react-query";
import { useMemo } from "react";
import { investigationKey } from "../../../lib/query-keys.ts";
import { getPlaces } from "../api/interview-api.ts";
import { type PlaceBook, placeBook } from "../form/place-book.ts";

/** Places on record for the place boxes; an empty book until they are there, or when they fail. */
export function usePlaceBook(investigationId: string): PlaceBook {
  const { data } = useQuery({
    queryKey: investigationKey(investigationId, "places", "for-interview"),
    queryFn: () => getPlaces(investigationId),
    staleTime: 5 * 60_000,
  });
  return useMemo(() => placeBook(data ?? []), [data]);
}
