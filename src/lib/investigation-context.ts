import { createContext, useContext } from "react";
import type { Investigation } from "../../shared/contracts/investigations.ts";

/** The acting investigation with its settings, zone and today; filled by the frame of rooms. */
export const InvestigationContext = createContext<Investigation | null>(null);

/** The acting investigation. Throws outside of a room. */
export function useInvestigation(): Investigation {
  const investigation = useContext(InvestigationContext);
  if (!investigation) throw new Error("useInvestigation is used outside of a room");
  return investigation;
}
