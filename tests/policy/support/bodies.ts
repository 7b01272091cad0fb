import { type CompareInput, packInput } from "../../../server/analysis/compare/compare-input.ts";
import type { AnyRoute } from "../../../server/http/route.ts";
import type { Role } from "../../../shared/roles.ts";
import type { Member } from "../../support/factories.ts";
import type { World } from "./world.ts";

const NOBODY: CompareInput = {
  format: 1,
  population: "all",
  n: 0,
  interviewedPeople: 0,
  complete: false,
  presetWindow: true,
  recall: null,
  namedByBoth: 0,
  namedByOne: 0,
  unresolvedGroupExposures: 0,
  undated: 0,
  leftOutPeople: 0,
  leftOutPairs: 0,
  studyNumbers: [],
  interviewed: null,
  order: [],
  attribute: null,
  classes: [],
  classOf: null,
  pairs: { a: [], b: [] },
  tellings: { a: [], b: [] },
};

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

/** A file of a member's that is ready to be fetched, and is empty; past the routes. */
export async function exportOf(
  world: World,
  role: Role,
  member: Member = world.everyone[role],
): Promise<string> {
  const made = await world.admin.query(
    `insert into core.export (id, investigation_id, kind, identified, purpose, role, columns, state,
       sha256, recorded_by, finished_at, expires_at)
     values (gen_random_uuid(), $1, 'people', false, 'analysis', $2, '{ref}', 'ready', $3, $4, now(),
       now() + interval '1 hour') returning id`,
    [member.investigationId, role, "0".repeat(64), member.accountId],
  );
  return made.rows[0].id;
}

/** A finished comparison of a member's, on nobody; past the routes. */
export async function madeRun(
  world: World,
  role: Role,
  member: Member = world.everyone[role],
): Promise<string> {
  const result = {
    seen: {
      state: "unseen",
      n: 0,
      interviewed: 0,
      coverage: null,
      doubleNamedShare: null,
      recall: null,
      unresolvedGroupExposures: 0,
      undated: 0,
      cautions: [],
    },
    comparisons: [],
    baselines: [],
    measures: [],
    degrees: { observed: [], baselines: {}, binomial: null, poisson: null },
    sizes: { observed: [], baselines: {} },
  };
  const made = await world.admin.query(
    `insert into core.compare_run (id, investigation_id, name, state, replicates, seed, population,
       time_window, question, as_of, cut_off, graph_version, core_version, generator, input, result,
       recorded_by)
     values (gen_random_uuid(), $1, 'A run', 'ready', 199, 1, 'all', 'preset', '{"population":"all"}',
       '2026-03-01', now(), 0, '1', 'none', $2, $3, $4) returning id`,
    [member.investigationId, await packInput(NOBODY), JSON.stringify(result), member.accountId],
  );
  return made.rows[0].id;
}

/** A body each route accepts, so that only access decides. A new route with a body stands here. */
const BODIES: Record<string, (world: World) => unknown> = {
  "patch /api/investigations/:id": () => ({ version: 1, infectiousBefore: 2 }),
  "patch /api/investigations/:id/settings": () => ({ version: 1, infectiousBefore: 2 }),
  "post /api/investigations/:id/settings/preview": () => ({ version: 1, infectiousBefore: 3 }),
  "post /api/investigations/:id/settings/practice-reset": () => ({ version: 1, name: "Some name" }),
  "post /api/investigations/:id/members": () => ({ email: "no@body.example", role: "tracer" }),
  "patch /api/investigations/:id/members/:memberId": () => ({ version: 1, endsOn: "2099-12-31" }),
  "post /api/investigations/:id/teams": () => ({ name: "Body team" }),
  "patch /api/investigations/:id/teams/:teamId": () => ({ version: 1, name: "Body team two" }),
  "post /api/investigations/:id/invitations": () => ({ email: "no@body.example", role: "tracer" }),
  "delete /api/investigations/:id/members": () => ({ email: "no@body.example", role: "tracer" }),
  "post /api/investigations/:id/people/search": () => ({ q: "Zqbody" }),
  "post /api/investigations/:id/people/assign": (world) => ({
    to: { kind: "member", accountId: world.everyone.tracer.accountId },
    people: [{ id: world.people.held, version: 1 }],
  }),
  "post /api/investigations/:id/people/filters": () => ({
    name: "Cases",
    filter: { classification: "case" },
  }),
  "patch /api/investigations/:id/people/filters/:filterId": () => ({ version: 1, name: "Other" }),
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
  "post /api/investigations/:id/follow-up/:personId/end": () => ({ reason: "moved" }),
  "post /api/investigations/:id/places": () => ({ name: "Hall", setting: "workplace" }),
  "post /api/investigations/:id/interviews": (world) => ({
    personId: world.people.held,
    outcome: "attempted",
    channel: "telephone",
  }),
  "put /api/investigations/:id/people/:personId/interview-draft": () => ({ version: 0, body: {} }),
  "post /api/investigations/:id/imports/:importId/matches": () => ({
    decision: "other",
    matchedOn: "name",
  }),
  "post /api/investigations/:id/exports": () => ({ kind: "people", purpose: "analysis" }),
  "post /api/investigations/:id/compare/runs": () => ({ name: "A run", replicates: 199 }),
  "patch /api/investigations/:id/compare/runs/:runId": () => ({ name: "Another name" }),
  "post /api/investigations/:id/imports/:importId/commit": () => ({ createMissing: false }),
};

/**
 * A body that a route accepts, by `method path`.
 *
 * @throws Error for a route without one
 */
export function acceptedBody(name: string, world: World): unknown {
  const make = BODIES[name];
  if (!make) throw new Error(`there is no body for ${name}; add one`);
  return make(world);
}

/** What is sent to a route in the matrix. */
export function bodyFor(route: AnyRoute, world: World): { body?: unknown; form?: FormData } {
  if (route.upload) {
    const form = new FormData();
    form.set("kind", "people");
    form.set("file", new Blob([PEOPLE_FILE], { type: "text/csv" }), "people.csv");
    return { form };
  }
  if (!route.body) return {};
  return { body: acceptedBody(`${route.method} ${route.path}`, world) };
}
