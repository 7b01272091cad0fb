/** One grid for the rows and their heads; on a phone two columns with the strip across both. */
export const followColumns =
  "grid grid-cols-[minmax(0,1fr)_auto] items-baseline gap-x-4 gap-y-1 " +
  "lg:grid-cols-[minmax(0,1.3fr)_10rem_8rem_11rem_minmax(0,2fr)]";
