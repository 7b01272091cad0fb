import express from "express";
import { afterAll, beforeAll, expect, test } from "vitest";
import { mount } from "../../server/http/mount.ts";
import { plainRoutes, ROUTES } from "../../server/routes.ts";
import { ROLES } from "../../shared/roles.ts";
import { startTestApp, type TestApp } from "../support/app.ts";
import { liveRoutes } from "./support/walk-app.ts";

let app: TestApp;

beforeAll(async () => {
  app = await startTestApp();
});

afterAll(async () => {
  await app?.close();
});

/** Outside the manifest by design: health, the document itself, and what catches the rest. */
const APART = [
  ...["/healthz", "/readyz", "/api/openapi.json"].flatMap((path) => [`GET ${path}`, `ALL ${path}`]),
  "GET /{*path}",
];

const declared = () =>
  [...ROUTES, ...plainRoutes(app.services)].map(
    (route) => `${route.method.toUpperCase()} ${route.path}`,
  );

test("the live application answers by the manifest and by nothing else", () => {
  const refusals = [...ROUTES, ...plainRoutes(app.services)].map((route) => `ALL ${route.path}`);
  const allowed = new Set([...declared(), ...refusals, ...APART]);
  // What catches the rest of /api answers every method with 404; the matrix knocks on it.
  const live = liveRoutes(app.app).filter((route) => !route.endsWith(" /api/{*rest}"));
  expect(live.filter((route) => !allowed.has(route))).toEqual([]);
  expect(declared().filter((route) => !live.includes(route))).toEqual([]);
  expect(new Set(declared()).size).toBe(declared().length);
});

test("a route planted beside the manifest is noticed, also behind a router", () => {
  const planted = express();
  mount(planted, app.services, ROUTES, plainRoutes(app.services));
  planted.get("/api/backdoor", (_request, response) => {
    response.end();
  });
  const router = express.Router();
  router.get("/x", (_request, response) => {
    response.end();
  });
  planted.use("/api/nested", router);
  const allowed = new Set([...declared(), ...declared().map((one) => one.replace(/^\w+/, "ALL"))]);
  expect(liveRoutes(planted).filter((route) => !allowed.has(route))).toEqual([
    "GET /api/backdoor",
    "router router",
  ]);
});

test("every route of an investigation lies under one, with a policy of known roles", () => {
  for (const route of ROUTES) {
    const name = `${route.method} ${route.path}`;
    expect(route.path, name).toMatch(/^\/api\/investigations\/:id(\/|$)/);
    expect(route.policy.length, name).toBeGreaterThan(0);
    expect(
      route.policy.every((role) => ROLES.includes(role)),
      name,
    ).toBe(true);
    // Creating without a key could be done twice.
    if (route.status === 201) expect(route.creates, name).toBe(true);
  }
});

test("the OpenAPI document lists every route with its roles", async () => {
  const answer = await fetch(`${app.origin}/api/openapi.json`);
  expect(answer.status).toBe(200);
  const document = (await answer.json()) as {
    openapi: string;
    paths: Record<string, Record<string, { "x-roles": string[]; parameters: { name: string }[] }>>;
  };
  expect(document.openapi).toBe("3.1.0");
  const listed = Object.entries(document.paths).flatMap(([path, methods]) =>
    Object.keys(methods).map((method) => `${method.toUpperCase()} ${path}`),
  );
  const braces = (name: string) => name.replace(/:(\w+)/g, "{$1}");
  expect(listed.sort()).toEqual(declared().map(braces).sort());
  for (const route of ROUTES) {
    const operation = document.paths[braces(route.path)]?.[route.method];
    expect(operation?.["x-roles"]).toEqual([...route.policy]);
    expect(operation?.parameters.some((one) => one.name === "Idempotency-Key")).toBe(
      route.creates === true,
    );
  }
});
