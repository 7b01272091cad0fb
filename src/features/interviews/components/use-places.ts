import { useQuery, useQueryClient } from "@tanstack/react-query";
import { useCallback, useEffect, useMemo, useRef, useState } from "react";
import type { Place } from "../../../../shared/contracts/places.ts";
import { investigationKey } from "../../../lib/query-keys.ts";
import { getPlaces } from "../api/interview-api.ts";
import { mayLookUp, type PlaceBook, placeBook } from "../form/place-book.ts";

const pauseMs = 300;
const staleTime = 5 * 60_000;
const none: readonly Place[] = [];

/** Places on record, with the way to ask for more of them by name. */
export type LivePlaceBook = PlaceBook & {
  lookUp: (typed: string, setting: string) => void;
};

/** Places for the place boxes: the first ones, and those that were looked up by name since. */
export function usePlaceBook(investigationId: string): LivePlaceBook {
  const queryClient = useQueryClient();
  const [found, setFound] = useState<ReadonlyMap<string, Place>>(new Map());
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const { data = none } = useQuery({
    queryKey: investigationKey(investigationId, "places", "for-interview"),
    queryFn: () => getPlaces(investigationId),
    staleTime,
  });
  useEffect(() => () => clearTimeout(timer.current), []);

  const lookUp = useCallback(
    (typed: string, setting: string) => {
      clearTimeout(timer.current);
      if (!mayLookUp(typed, setting)) return;
      const q = typed.trim();
      timer.current = setTimeout(() => {
        queryClient
          .fetchQuery({
            queryKey: investigationKey(investigationId, "places", "for-interview", q),
            queryFn: () => getPlaces(investigationId, q),
            staleTime,
          })
          .then((places) => {
            setFound(
              (before) => new Map([...before, ...places.map((one) => [one.id, one] as const)]),
            );
          })
          .catch(() => {
            // A name that is not offered can still be typed in full; the server knows it again.
          });
      }, pauseMs);
    },
    [queryClient, investigationId],
  );

  return useMemo(() => {
    const all = new Map([...data.map((one) => [one.id, one] as const), ...found]);
    return { ...placeBook([...all.values()]), lookUp };
  }, [data, found, lookUp]);
}
