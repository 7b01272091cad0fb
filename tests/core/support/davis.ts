import type { PublishedNetwork } from "./published-networks.ts";

/** The events each of the 18 women attended, in the order of the published table. */
const ATTENDED = [
  [1, 2, 3, 4, 5, 6, 8, 9],
  [1, 2, 3, 5, 6, 7, 8],
  [2, 3, 4, 5, 6, 7, 8, 9],
  [1, 3, 4, 5, 6, 7, 8],
  [3, 4, 5, 7],
  [3, 5, 6, 8],
  [5, 6, 7, 8],
  [6, 8, 9],
  [5, 7, 8, 9],
  [7, 8, 9, 12],
  [8, 9, 10, 12],
  [8, 9, 10, 12, 13, 14],
  [7, 8, 9, 10, 12, 13, 14],
  [6, 7, 9, 10, 11, 12, 13, 14],
  [7, 8, 10, 11, 12],
  [8, 9],
  [9, 11],
  [9, 11],
] as const;

/** Number of an event, E1 … E14, among the 32; the women are 0 … 17. */
export const davisEvent = (event: number): number => 17 + event;

/** Davis, Gardner & Gardner 1941, *Deep South*: 18 women and the 14 events they attended. */
export const davis = (): PublishedNetwork => ({
  n: 32,
  links: ATTENDED.flatMap((events, woman) =>
    events.map((event) => [woman, davisEvent(event)] as const),
  ),
});
