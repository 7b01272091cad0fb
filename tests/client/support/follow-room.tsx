import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { createMemoryRouter, RouterProvider } from "react-router-dom";
import { vi } from "vitest";
import type { FollowUpItem } from "../../../shared/contracts/follow-up.ts";
import {
  DEFAULT_CASE_RULES,
  DEFAULT_EXPOSURE_GRADING,
  type Settings,
} from "../../../shared/contracts/settings.ts";
import { ToastProvider } from "../../../src/components/ui/toast-provider.tsx";
import { Component } from "../../../src/features/follow-up/routes/follow-route.tsx";
import { addDays } from "../../../src/lib/calendar-day.ts";
import { InvestigationContext } from "../../../src/lib/investigation-context.ts";
import { investigation } from "./interview-desk.tsx";

export const item = (over: Partial<FollowUpItem>): FollowUpItem => ({
  id: "5f5c1d8a-3f0e-4f5c-8a69-6a1c4a8d7e02",
  studyNumber: "K4T-29X7",
  name: "Linnet Marsh",
  phone: "07700 900071",
  area: "Harbour",
  classification: "contact",
  assignedTo: null,
  dayZero: "2026-05-21",
  lastDueDay: "2026-06-04",
  dayNumber: 6,
  monitoringDays: 14,
  mine: true,
  version: 3,
  state: "under_follow_up",
  symptomatic: false,
  lastCheck: null,
  end: null,
  reopenedOn: null,
  dayZeroGap: null,
  expectedFrom: "2026-05-22",
  dueDays: Array.from({ length: 14 }, (_, index) => ({
    day: addDays("2026-05-22", index),
    outcome: null,
  })),
  together: null,
  ...over,
});

export const today = "2026-05-27";

const settingsOf = (symptoms: Settings["symptoms"]): Settings => ({
  name: "Harbour",
  invented: true,
  timeZone: "UTC",
  countryCode: "GB",
  populationAtRisk: null,
  caseDefinition: "",
  caseRules: DEFAULT_CASE_RULES,
  incubationMin: 1,
  incubationMax: 14,
  infectiousBefore: 2,
  infectiousAfter: 10,
  monitoringDays: 14,
  clusterWindowDays: 14,
  clusterMinimumCases: 2,
  closureDays: null,
  lostAfterDays: 3,
  smallCellThreshold: 5,
  exposureGrading: DEFAULT_EXPOSURE_GRADING,
  symptoms,
  texts: [],
  practice: false,
  caseDefinitionVersion: 1,
  closureDaysInForce: 28,
  today: "2026-05-27",
  version: 1,
});

/** Opens the Follow room on made-up answers; tells what was asked and sent. */
export function openRoom(
  items: FollowUpItem[],
  {
    at = "/follow",
    withoutDayZero = 0,
    total = 120,
    settings = () => Response.json(settingsOf([{ code: "itch", label: "Itching skin" }])),
    answer = (_count: number) => Response.json({ id: item({}).id }, { status: 201 }),
  } = {},
) {
  const asked: URLSearchParams[] = [];
  const sent: { path: string; key: string | null; body: unknown }[] = [];
  vi.stubGlobal("fetch", async (address: string, init: RequestInit = {}) => {
    const url = new URL(address, "http://localhost");
    if (init.method !== "GET") {
      sent.push({
        path: url.pathname.replace(/^.*\/follow-up\/|^.*\/people\//, ""),
        key: new Headers(init.headers).get("idempotency-key"),
        body: init.body ? JSON.parse(String(init.body)) : null,
      });
      return answer(sent.length);
    }
    if (url.pathname.endsWith("/settings")) return settings();
    asked.push(url.searchParams);
    const page = Number(url.searchParams.get("page"));
    const body = {
      items,
      total,
      page,
      pageSize: 50,
      today,
      withoutDayZero,
      lostAfterDays: 3,
    };
    return new Response(JSON.stringify(body), { headers: { "content-type": "application/json" } });
  });
  const router = createMemoryRouter(
    [
      { path: "/follow", element: <Component /> },
      { path: "*", element: <p>another page</p> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider
      client={new QueryClient({ defaultOptions: { queries: { retry: false } } })}
    >
      <InvestigationContext value={investigation}>
        <ToastProvider>
          <RouterProvider router={router} />
        </ToastProvider>
      </InvestigationContext>
    </QueryClientProvider>,
  );
  return { asked, sent, router, user: userEvent.setup({ delay: null }) };
}
