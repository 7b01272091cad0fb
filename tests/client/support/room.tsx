import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render } from "@testing-library/react";
import type { ComponentType } from "react";
import { createMemoryRouter, RouterProvider, useLocation } from "react-router-dom";
import { vi } from "vitest";
import type { Investigation } from "../../../shared/contracts/investigations.ts";
import type { Session } from "../../../shared/contracts/session.ts";
import { CutOffContext } from "../../../src/lib/cut-off-context.ts";
import { InvestigationContext } from "../../../src/lib/investigation-context.ts";
import { SessionContext } from "../../../src/lib/session-context.ts";
import { ids } from "./network-answers.ts";

const investigation: Investigation = {
  id: ids.investigation,
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
  graphVersion: 1482,
  version: 1,
  roles: ["epidemiologist"],
};

/** A path inside the investigation (with its query) → what the server answers. */
export type Answers = (
  path: string,
  query: URLSearchParams,
  request: { method: string; body: unknown },
) => unknown;

export type RoomOptions = {
  room: ComponentType;
  at: string;
  /** Pattern of the page's address, where it holds an id. */
  path?: string;
  /** Every part of the page is in sight, with what is fetched only then. */
  near?: boolean;
  rooms: Session["rooms"];
  answers: Answers;
  /** More of the session, where the room looks at it. */
  session?: Partial<Session>;
};

/** Renders a room on answers of one's own; gives what was asked for and the cut-offs it showed. */
export function renderRoom(options: RoomOptions) {
  const {
    room: Room,
    at,
    path: pattern = "/room",
    rooms,
    near = false,
    answers,
    session: more,
  } = options;
  const asked: string[] = [];
  const cutOffs: unknown[] = [];
  const start = `/api/investigations/${ids.investigation}/`;
  vi.stubGlobal("fetch", async (address: string, { method = "GET", body }: RequestInit = {}) => {
    const url = new URL(address, "http://localhost");
    const path = url.pathname.replace(start, "");
    asked.push(`${method === "GET" ? "" : `${method} `}${path}${url.search}`);
    const sent = typeof body === "string" ? (JSON.parse(body) as unknown) : undefined;
    const answer = answers(path, url.searchParams, { method, body: sent });
    if (answer instanceof Response) return answer;
    return new Response(JSON.stringify(answer), {
      headers: { "content-type": "application/json" },
    });
  });
  // Nothing comes near by itself in a page without layout: drawing libraries are not fetched.
  vi.stubGlobal(
    "IntersectionObserver",
    class {
      constructor(private readonly seen: IntersectionObserverCallback) {}
      observe() {
        const entries = [{ isIntersecting: near }] as IntersectionObserverEntry[];
        if (near) this.seen(entries, this as unknown as IntersectionObserver);
      }
      disconnect() {}
    },
  );
  const queryClient = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  const session = { rooms, ...more } as Session;
  const router = createMemoryRouter(
    [
      { path: pattern, element: <Room /> },
      { path: "*", element: <Elsewhere /> },
    ],
    { initialEntries: [at] },
  );
  render(
    <QueryClientProvider client={queryClient}>
      <SessionContext value={session}>
        <InvestigationContext value={investigation}>
          <CutOffContext value={(cutOff) => void cutOffs.push(cutOff)}>
            <RouterProvider router={router} />
          </CutOffContext>
        </InvestigationContext>
      </SessionContext>
    </QueryClientProvider>,
  );
  return { asked, cutOffs, queryClient };
}

function Elsewhere() {
  const { pathname, search } = useLocation();
  return <p>{`at ${pathname}${search}`}</p>;
}
