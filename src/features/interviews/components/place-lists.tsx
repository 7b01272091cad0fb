import { SETTINGS } from "../../../../shared/vocabulary.ts";
import type { PlaceBook } from "../form/place-book.ts";

/** Id of the list of places that a box of this setting offers. */
export function placeListId(setting: string): string {
  return (SETTINGS as readonly string[]).includes(setting) ? `places-${setting}` : "places-all";
}

/** The lists of places that place boxes offer: one a setting, and one of all. */
export function PlaceLists({ places }: { places: PlaceBook }) {
  return (
    <>
      {["all", ...SETTINGS].map((setting) => (
        <datalist key={setting} id={`places-${setting}`}>
          {places.all
            .filter((place) => setting === "all" || place.setting === setting)
            .map((place) => (
              <option key={place.id} value={place.label}>
                {[place.setting === "health_care" ? "health care" : place.setting, place.area]
                  .filter(Boolean)
                  .join(", ")}
              </option>
            ))}
        </datalist>
      ))}
    </>
  );
}
