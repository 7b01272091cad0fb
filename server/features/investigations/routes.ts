import { z } from "zod";
import { listQuery } from "../../../shared/contracts/common.ts";
import {
  investigationAnswer,
  investigationInput,
  investigationList,
} from "../../../shared/contracts/investigations.ts";
import { ROLES, type Role } from "../../../shared/roles.ts";
import { withTx } from "../../db/with-tx.ts";
import { type AnyRoute, definePlainRoute, defineRoute, type PlainRoute } from "../../http/route.ts";
import { signedInOf } from "../../http/sign-in.ts";
import type { Services } from "../../services.ts";
import { createInvestigation } from "./commands/create-investigation.ts";
import { presentInvestigation } from "./present.ts";
import { listInvestigations, loadInvestigation } from "./store.ts";

/** Investigations of the signed-in account, and making a new one. */
export function investigationPlainRoutes(services: Services): PlainRoute[] {
  const rolesIn = (memberships: readonly { investigationId: string; role: Role }[], id: string) =>
    memberships.filter((one) => one.investigationId === id).map((one) => one.role);
  return [
    definePlainRoute({
      method: "get",
      path: "/api/investigations",
      summary: "Investigations in which the signed-in account holds a role",
      access: "signedIn",
      query: listQuery,
      output: investigationList,
      async handle(request, response) {
        const query = response.locals.query as z.output<typeof listQuery>;
        const who = signedInOf(request);
        const ids = [...new Set(who.memberships.map((one) => one.investigationId))];
        const rows = await withTx({ pool: services.pools.auth, nonce: null }, (tx) =>
          listInvestigations(tx, ids),
        );
        const from = (query.page - 1) * query.pageSize;
        return {
          items: rows
            .slice(from, from + query.pageSize)
            .map((row) => presentInvestigation(row, rolesIn(who.memberships, row.id))),
          total: rows.length,
          page: query.page,
          pageSize: query.pageSize,
        };
      },
    }),
    definePlainRoute({
      method: "post",
      path: "/api/investigations",
      summary: "Open a new investigation",
      access: ["supervisor", "officer"],
      body: investigationInput,
      output: z.strictObject({ id: z.uuid(), version: z.int() }),
      status: 201,
      creates: true,
      handle: (request, response) =>
        createInvestigation(
          services,
          signedInOf(request),
          response.locals.body as z.output<typeof investigationInput>,
          request.get("idempotency-key") as string,
        ),
    }),
  ];
}

const params = z.object({ id: z.uuid() });

/** The acting investigation. */
export const investigationRoutes: AnyRoute[] = [
  defineRoute({
    method: "get",
    path: "/api/investigations/:id",
    summary: "The investigation and its settings",
    policy: ROLES,
    params,
    output: investigationAnswer,
    async run({ tx, actor }) {
      return presentInvestigation(await loadInvestigation(tx, actor.investigationId), [actor.role]);
    },
  }),
];
