/**
 * One grid for a contact row and its heads. Phone: two columns; tablet: two lines of twelve; wide:
 * one line a row. The wide columns are fixed so that heads and rows agree.
 */
export const contactColumns =
  "grid-cols-2 gap-x-2 gap-y-2 lg:grid-cols-12 min-[85rem]:gap-x-1.5 min-[85rem]:grid-cols-[1.25rem_minmax(9rem,1.5fr)_minmax(8.25rem,1fr)_7.5rem_minmax(7rem,1.2fr)_7rem_7rem_4.75rem_4.75rem_6rem_6rem_minmax(6rem,1fr)_3.75rem]";

/** How many of the twelve columns each box takes on a tablet; the phone's full lines besides. */
export const contactSpans = {
  name: "col-span-2 lg:col-span-3 min-[85rem]:col-span-1",
  phone: "col-span-2 lg:col-span-3 min-[85rem]:col-span-1",
  setting: "lg:col-span-2 min-[85rem]:col-span-1",
  place: "lg:col-span-4 min-[85rem]:col-span-1",
  firstExposure: "col-span-2 lg:col-span-2 min-[85rem]:col-span-1",
  lastExposure: "col-span-2 lg:col-span-2 min-[85rem]:col-span-1",
  minutes: "lg:col-span-1",
  distanceM: "lg:col-span-1",
  physical: "lg:col-span-2 min-[85rem]:col-span-1",
  indoors: "lg:col-span-2 min-[85rem]:col-span-1",
  relation: "col-span-2 lg:col-span-2 min-[85rem]:col-span-1",
} as const;

/** Heads of the contact columns, in the order of the boxes. */
export const contactHeads = {
  name: "Name",
  phone: "Phone",
  setting: "Setting",
  place: "Place",
  firstExposure: "First day",
  lastExposure: "Last day",
  minutes: "Minutes",
  distanceM: "Metres",
  physical: "Touch",
  indoors: "Indoors",
  relation: "Relation",
} as const;

/** What a head means, where a word alone could be misread. */
export const contactMeanings: Partial<Record<keyof typeof contactHeads, string>> = {
  firstExposure: "first day of exposure",
  lastExposure: "last day of exposure",
  minutes: "minutes together in all",
  distanceM: "distance in metres",
  physical: "direct physical contact",
};
