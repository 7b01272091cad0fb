import type { Place } from "../../../../shared/contracts/places.ts";

/** A place as a box offers it. */
export interface ListedPlace {
  id: string;
  label: string;
  setting: string | null;
  area: string | null;
}

/** Places on record, found by what stands in a place box. */
export interface PlaceBook {
  all: readonly ListedPlace[];
  /** The place of that name; with a setting, only one of that setting. */
  find: (label: string, setting: string) => ListedPlace | undefined;
}

/** Settings whose places are named after no private person. */
const publicSettings = ["workplace", "school", "health_care", "transport"];

/**
 * True when places may be asked for by what is typed: the question stands in an address, so only
 * names of facilities go into it, never what may be somebody's home.
 */
export function mayLookUp(typed: string, setting: string): boolean {
  return publicSettings.includes(setting) && typed.trim().length >= 2;
}

const folded = (text: string) => text.trim().toLocaleLowerCase();

/** Makes the book; a household whose name one may not open goes by its number. */
export function placeBook(places: readonly Place[]): PlaceBook {
  const all = places.map(({ id, name, number, setting, area }) => ({
    id,
    label: name ?? `${setting === "household" ? "household" : "place"} ${number}`,
    setting,
    area,
  }));
  return {
    all,
    find: (label, setting) => {
      const wanted = folded(label);
      if (wanted === "") return undefined;
      return all.find(
        (place) => folded(place.label) === wanted && (setting === "" || place.setting === setting),
      );
    },
  };
}
