import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render } from "@testing-library/react";
import type { ReactNode } from "react";
import { createMemoryRouter, RouterProvider, useLocation } from "react-router-dom";
import { vi } from "vitest";
import type { Investigation } from "../../../shared/contracts/investigations.ts";
import type { Session } from "../../../shared/contracts/session.ts";
import type { Role } from "../../../shared/roles.ts";
import { ToastProvider } from "../../../src/components/ui/toast-provider.tsx";
import { InvestigationContext } from "../../../src/lib/investigation-context.ts";
import { SessionContext } from "../../../src/lib/session-context.ts";

export const investigationId = "11111111-1111-4111-8111-111111111111";
export const personId = "22222222-2222-4222-8222-222222222222";
export const accountId = "33333333-3333-4333-8333-333333333333";

/** The session of somebody acting in the investigation of these tests. */
export function sessionOf(role: Role): Session {
  return {
    accountId,
    displayName: "Somebody",
    email: "somebody@strandline.example",
    demo: true,
    actingRole: role,
    investigationId,
    rooms: [],
    memberships: [{ investigationId, investigationName: "Sallow Bay", invented: true, role }],
    idleMinutes: 30,
    endsAt: "2099-01-01T00:00:00Z",
  };
}

const investigation: Investigation = {
  id: investigationId,
  name: "Sallow Bay",
  invented: true,
  timeZone: "UTC",
  countryCode: "GB",
  today: "2026-05-27",
  populationAtRisk: null,
  infectiousBefore: 2,
  infectiousAfter: 10,
  incubationMin: 1,
  incubationMax: 14,
  monitoringDays: 14,
  practice: false,
  caseDefinitionVersion: 1,
  graphVersion: 3,
  version: 1,
  roles: [],
};

export interface Sent {
  method: string;
  /** Inside the investigation, with its query. */
  path: string;
  body: unknown;
  key: string | null;
}
export type Answer = (request: Sent) => { status?: number; body: unknown };

/** Renders pages on answers of one's own, and keeps every request that was sent. */
export function renderDesk(
  routes: { path: string; element: ReactNode }[],
  at: string,
  options: { role: Role; answer: Answer },
) {
  const sent: Sent[] = [];
  const start = `/api/investigations/${investigationId}/`;
  vi.stubGlobal("fetch", async (address: string, init: RequestInit = {}) => {
    const request: Sent = {
      method: init.method ?? "GET",
      path: address.replace(start, ""),
      body: typeof init.body === "string" ? JSON.parse(init.body) : null,
      key: new Headers(init.headers).get("idempotency-key"),
    };
    sent.push(request);
    const { status = 200, body } = options.answer(request);
    return new Response(JSON.stringify(body), { status });
  });
  vi.stubGlobal("scrollTo", () => {});
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const router = createMemoryRouter([...routes, { path: "*", element: <Elsewhere /> }], {
    initialEntries: [at],
  });
  render(
    <QueryClientProvider client={queryClient}>
      <ToastProvider>
        <SessionContext value={sessionOf(options.role)}>
          <InvestigationContext value={investigation}>
            <RouterProvider router={router} />
          </InvestigationContext>
        </SessionContext>
      </ToastProvider>
    </QueryClientProvider>,
  );
  return { sent, router, queryClient };
}

function Elsewhere() {
  return <p>at {useLocation().pathname}</p>;
}
