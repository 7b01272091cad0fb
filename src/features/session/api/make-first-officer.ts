import { useMutation } from "@tanstack/react-query";
import { z } from "zod";
import type { firstOfficerInput } from "../../../../shared/contracts/session.ts";
import { api } from "../../../lib/api-client.ts";

const answer = z.object({ made: z.boolean() });

/** Makes the first officer of an empty installation. */
export function useMakeFirstOfficer() {
  return useMutation({
    mutationFn: (body: z.output<typeof firstOfficerInput>) =>
      api.post("/api/first-officer", { body, schema: answer }),
  });
}
