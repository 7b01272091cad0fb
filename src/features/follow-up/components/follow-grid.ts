/** One grid for the rows and their heads; on a phone two columns with the strip across both. */
export const followColumns =
  "grid grid-cols-[minmax(0,1fr)_auto] items-center gap-x-4 gap-y-1 lg:grid-cols-[minmax(0,1.4fr)_9rem_7rem_13.5rem_minmax(0,1.6fr)]";
