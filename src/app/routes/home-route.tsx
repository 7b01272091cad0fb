import { Navigate } from "react-router-dom";
import { useSession } from "../../lib/session-context.ts";
import { homePath } from "../rooms.ts";

/** The bare address leads to the acting role's own room. */
export function Component() {
  return <Navigate to={homePath(useSession())} replace />;
}
