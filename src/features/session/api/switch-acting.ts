import type { z } from "zod";
import { sessionAnswer, type switchInput } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";

/** Acts in another role or investigation; the server gives the session a new id. */
export function switchActing(body: z.output<typeof switchInput>) {
  return api.patch("/api/session", { body, schema: sessionAnswer });
}
