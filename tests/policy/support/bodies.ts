import type { AnyRoute } from "../../../server/http/route.ts";
import type { Member } from "../../support/factories.ts";
import type { World } from "./world.ts";

const PEOPLE_FILE = "ref,name,area\nstaged-1,Staged Person,North\n";

/** Uploads a small file and returns the id of its import. */
export async function stageImport(member: Member): Promise<string> {
  const answer = await member.client.upload(
    `${member.base}/imports`,
    { kind: "people" },
    PEOPLE_FILE,
    "people.csv",
  );
  if (!answer.body.id) throw new Error(`the file was not staged: ${JSON.stringify(answer.body)}`);
  return answer.body.id;
}

/** A body each route accepts, so that only access decides. A new route with a body stands here. */
const BODIES: Record<string, (world: World) => unknown> = {
  "patch /api/investigations/:id": () => ({ version: 1, infectiousBefore: 2 }),
  "patch /api/investigations/:id/settings": () => ({ version: 1, infectiousBefore: 2 }),
  "post /api/investigations/:id/settings/preview": () => ({ version: 1, infectiousBefore: 3 }),
  "post /api/investigations/:id/settings/practice-reset": () => ({ version: 1, name: "Some name" }),
  "post /api/investigations/:id/members": () => ({ email: "no@body.example", role: "tracer" }),
  "post /api/investigations/:id/invitations": () => ({ email: "no@body.example", role: "tracer" }),
  "delete /api/investigations/:id/members": () => ({ email: "no@body.example", role: "tracer" }),
  "post /api/investigations/:id/people/search": () => ({ q: "Zqbody" }),
  "post /api/investigations/:id/people": () => ({ area: "South" }),
  "post /api/investigations/:id/people/matches": () => ({ name: "Some Body" }),
  "patch /api/investigations/:id/people/:personId": () => ({ version: 1, area: "South" }),
  "post /api/investigations/:id/people/:personId/tests": () => ({
    specimenDate: "2026-03-01",
    kind: "PCR",
    result: "negative",
  }),
  "post /api/investigations/:id/follow-up/:personId/checks": () => ({
    outcome: "spoken",
    symptoms: "no",
    respondent: "self",
  }),
  "post /api/investigations/:id/places": () => ({ name: "Hall", setting: "workplace" }),
  "post /api/investigations/:id/interviews": (world) => ({
    personId: world.people.held,
    outcome: "attempted",
    channel: "telephone",
  }),
  "put /api/investigations/:id/people/:personId/interview-draft": () => ({ version: 0, body: {} }),
  "post /api/investigations/:id/imports/:importId/commit": () => ({ createMissing: false }),
};

/** What is sent to a route in the matrix. */
export function bodyFor(route: AnyRoute, world: World): { body?: unknown; form?: FormData } {
  if (route.upload) {
    const form = new FormData();
    form.set("kind", "people");
    form.set("file", new Blob([PEOPLE_FILE], { type: "text/csv" }), "people.csv");
    return { form };
  }
  const name = `${route.method} ${route.path}`;
  if (!route.body) return {};
  const make = BODIES[name];
  if (!make) throw new Error(`the matrix has no body for ${name}; add one`);
  return { body: make(world) };
}
