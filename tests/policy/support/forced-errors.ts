import { randomUUID } from "node:crypto";
import type { Knock } from "./visitors.ts";
import type { World } from "./world.ts";

interface Forced {
  what: string;
  request: Omit<Knock, "cookie">;
  /** What it may be answered with (403 besides, for roles without the route). */
  status: number[];
}

function upload(path: string, kind: string, text: string, name: string): Omit<Knock, "cookie"> {
  const form = new FormData();
  form.set("kind", kind);
  form.set("file", new Blob([text], { type: "text/csv" }), name);
  return { method: "post", path, form };
}

/** Requests that carry markers and must fail, or at least must not bring them back. */
export function forcedErrors(world: World): Forced[] {
  const base = `/api/investigations/${world.here}`;
  const one = world.marked.stranger;
  const json = (method: string, path: string, body: unknown) => ({
    method,
    path: `${base}${path}`,
    body,
  });
  const contact = { name: one.name, phone: one.phone, relation: one.note, place: one.household };
  return [
    {
      what: "a person with a wrong date",
      request: json("post", "/people", { ...one, onsetDate: one.name }),
      status: [422],
    },
    {
      what: "a person with a key that is none",
      request: json("post", "/people", { [one.name]: one.phone }),
      status: [422],
    },
    {
      what: "a person that is a list",
      request: json("post", "/people", [one.name]),
      status: [422],
    },
    {
      what: "a reference that is taken",
      request: json("post", "/people", { ref: one.ref, name: one.name }),
      status: [409, 422],
    },
    {
      what: "a person changed under an old version",
      request: json("patch", `/people/${world.people.held}`, { version: 999, name: one.name }),
      status: [409],
    },
    {
      what: "an assignment to a name",
      request: json("patch", `/people/${world.people.held}`, { version: 1, assignedTo: one.name }),
      status: [422],
    },
    {
      what: "a test of nothing",
      request: json("post", `/people/${world.people.held}/tests`, {
        specimenDate: one.birthDate,
        resultDate: "1900-01-01",
        kind: one.note,
      }),
      status: [422],
    },
    {
      what: "an interview with impossible contacts",
      request: json("post", "/interviews", {
        personId: world.people.held,
        outcome: one.name,
        contacts: [{ ...contact, firstExposure: one.name, setting: one.household }],
      }),
      status: [422],
    },
    {
      what: "a telephone number that is none",
      request: json("post", "/interviews", {
        personId: world.people.held,
        outcome: "complete",
        contacts: [{ ...contact, phone: one.name }],
      }),
      status: [422],
    },
    {
      what: "a draft under an old version",
      request: json("put", `/people/${world.people.held}/interview-draft`, {
        version: 999,
        body: { contacts: [contact] },
      }),
      status: [409],
    },
    {
      what: "a place of no kind",
      request: json("post", "/places", { name: one.household, setting: one.name }),
      status: [422],
    },
    {
      what: "a search too long",
      request: json("post", "/people/search", { q: one.name.repeat(40) }),
      status: [422],
    },
    {
      what: "a search with a key that is none",
      request: json("post", "/people/search", { [one.email]: 1 }),
      status: [422],
    },
    {
      what: "a sort by a value",
      request: { method: "get", path: `${base}/people?sort=${encodeURIComponent(one.name)}` },
      status: [422],
    },
    {
      what: "a page that is a name",
      request: { method: "get", path: `${base}/people?page=${encodeURIComponent(one.name)}` },
      status: [422],
    },
    {
      what: "a name in the place of an id",
      request: { method: "get", path: `${base}/people/${encodeURIComponent(one.name)}` },
      status: [404],
    },
    {
      what: "an address nobody knows",
      request: { method: "get", path: `/api/${encodeURIComponent(one.phone)}` },
      status: [404],
    },
    {
      what: "a method nobody knows",
      request: { method: "delete", path: `${base}/people?q=${encodeURIComponent(one.email)}` },
      status: [405],
    },
    {
      what: "a key that is no key",
      request: {
        ...json("post", "/people", { name: one.name }),
        headers: { "Idempotency-Key": one.email },
      },
      status: [400],
    },
    {
      what: "another site's request",
      request: {
        ...json("post", "/people", { name: one.name }),
        headers: { Origin: `https://${one.email.split("@")[0]}.example` },
      },
      status: [403],
    },
    {
      what: "a body that is no JSON",
      request: {
        ...json("post", "/people", { name: one.name }),
        headers: { "Content-Type": "text/plain" },
      },
      status: [415],
    },
    {
      what: "a member with somebody's e-mail",
      request: json("post", "/members", { email: one.email, role: "tracer" }),
      status: [422],
    },
    {
      what: "a sign-in with somebody's e-mail",
      request: {
        method: "post",
        path: "/api/session",
        body: { email: one.email, password: one.name },
      },
      status: [401],
    },
    {
      what: "a file with bad rows",
      request: upload(
        `${base}/imports`,
        "people",
        `ref,name,phone,onset_date\n${randomUUID()},${one.name},${one.name},${one.name}\n`,
        `${one.name}.csv`,
      ),
      status: [201],
    },
    {
      what: "a file with a column that is a name",
      request: upload(
        `${base}/imports`,
        "people",
        `ref,${one.name}\n${randomUUID()},${one.phone}\n`,
        "people.csv",
      ),
      status: [201, 422],
    },
    {
      what: "a file that contradicts the record",
      request: upload(
        `${base}/imports`,
        "people",
        `ref,name,phone\n${one.ref},${world.marked.held.name},${world.marked.held.phone}\n`,
        "people.csv",
      ),
      status: [201],
    },
    {
      what: "a file of pairs between nobody",
      request: upload(
        `${base}/imports`,
        "pairs",
        `ref_a,ref_b,place\n${one.email},${one.ref},${one.household}\n`,
        "pairs.csv",
      ),
      status: [201],
    },
    {
      what: "a file that is none",
      request: upload(`${base}/imports`, "people", `"${one.name}`, "people.csv"),
      status: [201, 422],
    },
  ];
}
