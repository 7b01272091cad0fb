import { createContext, useContext } from "react";
import type { Session } from "../../shared/contracts/session.ts";

/** The signed-in session; filled by the frame of signed-in pages. */
export const SessionContext = createContext<Session | null>(null);

/** Who is signed in and acts as what. Throws outside of signed-in pages. */
export function useSession(): Session {
  const session = useContext(SessionContext);
  if (!session) throw new Error("useSession is used outside of a signed-in page");
  return session;
}
