import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { act, configure, render, screen, waitFor } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { vi } from "vitest";
import type { Investigation } from "../../../shared/contracts/investigations.ts";
import type { Match, PersonPage } from "../../../shared/contracts/people.ts";
import { ToastProvider } from "../../../src/components/ui/toast-provider.tsx";
import { Component } from "../../../src/features/interviews/routes/interview-route.tsx";
import { InvestigationContext } from "../../../src/lib/investigation-context.ts";

// Many keys, and perhaps a busy machine.
configure({ asyncUtilTimeout: 15_000 });

export const caseId = "0b0e7c1e-6d0a-4f7e-9d0e-0d8f1c2b3a41";
export const knownId = "5f5c1d8a-3f0e-4f5c-8a69-6a1c4a8d7e02";
export const placeId = "7d1f8a52-2a0b-4b7e-a6a9-4f1f6c2d9b03";
const investigationId = "2e9a6f10-8c45-4b1f-9a53-1d6b7c8e9f04";

export const investigation: Investigation = {
  id: investigationId,
  name: "Sallow Bay",
  invented: true,
  timeZone: "Europe/Dublin",
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
  graphVersion: 1482,
  version: 1,
  roles: ["tracer"],
};

export const person: PersonPage = {
  id: caseId,
  studyNumber: "D-0412",
  version: 1,
  recordedAt: "2026-05-22T09:00:00Z",
  name: "Wren Alder",
  ageBand: "25-44",
  sex: "female",
  area: "Quayside",
  householdNumber: null,
  classification: "confirmed",
  becameCase: false,
  onsetDate: "2026-05-20",
  specimenDate: "2026-05-21",
  resultDate: null,
  result: "positive",
  reportDate: null,
  interviewDate: null,
  interviewed: null,
  interviewState: null,
  isolationDate: null,
  outcome: null,
  outcomeDate: null,
  diedDate: null,
  can: { interview: true },
  windows: {
    infectious: { from: "2026-05-18", to: "2026-05-30", basis: "onset" },
    source: { from: "2026-05-06", to: "2026-05-19" },
  },
  monitoring: null,
  classifications: [],
  pairs: [],
  groupExposures: [],
  attempts: [],
};

export const match: Match = {
  personId: knownId,
  studyNumber: "D-0099",
  name: "Linnet Marsh",
  phoneLast2: "71",
  ageBand: "45-64",
  area: "Harbour",
  classification: "contact",
  matchedOn: ["phone", "name"],
};

type Sent = {
  method: string;
  path: string;
  body: Record<string, unknown>;
  key: string | null;
  query: string;
};
type Draft = { version: number; body: unknown; updatedAt: string | null };

const json = (body: unknown, status = 200) =>
  new Response(JSON.stringify(body), {
    status,
    headers: { "content-type": status < 400 ? "application/json" : "application/problem+json" },
  });

/** A refusal as the API words it. */
export const problem = (status: number, code: string, errors?: unknown) =>
  json({ type: "about:blank", title: code, status, code, instance: "/x", errors }, status);

/** The server's side of one interview: a draft with versions, matches, places, interviews. */
export function interviewServer() {
  const server = {
    draft: { version: 0, body: null, updatedAt: null } as Draft,
    matches: [] as Match[],
    person,
    sent: [] as Sent[],
    offline: false,
    /** Answers instead of the ordinary one, used up in order. */
    interviewAnswers: [] as (() => Response)[],
    of: (method: string, path: string) =>
      server.sent.filter((one) => one.method === method && one.path === path),
  };
  const draftPath = `people/${caseId}/interview-draft`;

  function answer(method: string, path: string, body: Record<string, unknown>): Response {
    if (path === `people/${caseId}`) return json(server.person);
    if (path === "places") {
      const place = { id: placeId, number: 3, name: "Tideway market", setting: "other" };
      const item = { ...place, area: "Quayside", recordedAt: "2026-05-01T00:00:00Z", version: 1 };
      return json({ items: [item], total: 1, page: 1, pageSize: 200 });
    }
    if (path === "people/matches") return json({ items: server.matches });
    if (path === draftPath && method === "GET") return json(server.draft);
    if (path === draftPath && method === "PUT") {
      if (body.version !== server.draft.version) return problem(409, "stale_version");
      server.draft = {
        version: server.draft.version + 1,
        body: body.body,
        updatedAt: "2026-05-27T13:32:00Z",
      };
      return json(server.draft);
    }
    if (path === "interviews" && method === "POST") {
      const special = server.interviewAnswers.shift();
      if (special) return special();
      return json({ id: "9c9e6679-7425-40de-944b-e07fc1f90ae7", graphVersion: 1483 }, 201);
    }
    return problem(404, "not_found");
  }

  vi.stubGlobal("fetch", async (address: string, init: RequestInit) => {
    const url = new URL(address, "http://localhost");
    const path = url.pathname.replace(`/api/investigations/${investigationId}/`, "");
    const body = init.body ? JSON.parse(String(init.body)) : {};
    const method = init.method ?? "GET";
    const key = new Headers(init.headers).get("Idempotency-Key");
    if (server.offline) throw new TypeError("no network");
    server.sent.push({ method, path, body, key, query: url.search });
    return answer(method, path, body);
  });
  return server;
}

/** Opens the page of the interview of the case, whatever it shows. */
export function renderInterview() {
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const at = `/i/${investigationId}/trace/people/${caseId}/interview`;
  const router = createMemoryRouter(
    [
      { path: "/i/:investigationId/trace/people/:personId/interview", element: <Component /> },
      { path: "*", element: <p>another page</p> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <ToastProvider>
        <InvestigationContext value={investigation}>
          <RouterProvider router={router} />
        </InvestigationContext>
      </ToastProvider>
    </QueryClientProvider>,
  );
  return { user: userEvent.setup({ delay: null }), router };
}

/** Opens the interview of the case, with the cursor where the page puts it. */
export async function openInterview() {
  const opened = renderInterview();
  await screen.findByRole("form", { name: "Interview of D-0412" });
  await waitFor(() => {
    if (!document.querySelector("#places-all option")) throw new Error("no places yet");
  });
  return opened;
}

/** Lets time pass for timers and what follows from them; with fake timers only. */
export async function pass(ms: number) {
  await act(() => vi.advanceTimersByTimeAsync(ms));
}
