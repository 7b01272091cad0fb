import { createContext, useContext } from "react";
import type { PersonPage } from "../../../../shared/contracts/people.ts";
import type { LivePlaceBook } from "./use-places.ts";

/** What every row of an interview form needs to know. */
export interface FormSurroundings {
  investigationId: string;
  person: PersonPage;
  /** The investigation's day. */
  today: string;
  places: LivePlaceBook;
}

export const FormSurroundingsContext = createContext<FormSurroundings | null>(null);

/** The surroundings of the form. Throws outside of one. */
export function useFormSurroundings(): FormSurroundings {
  const value = useContext(FormSurroundingsContext);
  if (!value) throw new Error("useFormSurroundings is used outside of an interview form");
  return value;
}
