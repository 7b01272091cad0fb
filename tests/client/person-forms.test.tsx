import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import { PersonRecord } from "../../src/features/people/components/person-record.tsx";
import { Component as RegisterRoute } from "../../src/features/people/routes/register-person-route.tsx";
import { type Answer, investigationId, personId, renderDesk } from "./support/trace-desk.tsx";

const trace = `/i/${investigationId}/trace`;
const noMatch = { body: { items: [] } };

function openRegister(answer: Answer) {
  return renderDesk(
    [{ path: "/i/:investigationId/trace/people/new", element: <RegisterRoute /> }],
    `${trace}/people/new`,
    { role: "tracer", answer },
  );
}

afterEach(cleanup);

describe("registering a person", () => {
  it("sends blanks as not asked, words as words, and one key however often it is pressed", async () => {
    let tries = 0;
    const { sent } = openRegister(({ path }) => {
      if (path === "people/matches") return noMatch;
      tries += 1;
      return tries === 1
        ? { status: 503, body: { code: "unavailable" } }
        : { status: 201, body: { id: personId, studyNumber: "AAA-0001", version: 1 } };
    });
    const user = userEvent.setup();
    await user.type(screen.getByLabelText("Name"), "Ada Invented");
    await user.type(screen.getByLabelText("Onset of illness"), "-2");
    await user.click(screen.getByRole("button", { name: "Isolated since: refused" }));
    await user.type(screen.getByLabelText("Birth date"), "1990-05");
    await user.click(screen.getByRole("button", { name: "Register" }));
    expect(await screen.findByText(/saving again makes no second person/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Register" }));
    expect(await screen.findByText(`at ${trace}/people/${personId}`)).toBeTruthy();

    const saves = sent.filter((one) => one.path === "people");
    expect(saves).toHaveLength(2);
    expect(saves[0]?.key).toMatch(/^[0-9a-f-]{36}$/);
    expect(saves[1]?.key).toBe(saves[0]?.key);
    expect(saves[1]?.body).toMatchObject({
      name: "Ada Invented",
      onsetDate: "2026-05-25",
      isolationDate: "refused",
      birthDate: "1990-05",
      reportDate: "2026-05-27",
      phone: null,
      sex: null,
    });
  });

  it("goes on to the interview of a case", async () => {
    openRegister(({ path }) =>
      path === "people/matches"
        ? noMatch
        : { status: 201, body: { id: personId, studyNumber: "AAA-0001", version: 1 } },
    );
    const user = userEvent.setup();
    await user.selectOptions(screen.getByLabelText("Classification"), "suspected");
    await user.click(screen.getByRole("button", { name: "Register" }));
    expect(await screen.findByText(`at ${trace}/people/${personId}/interview`)).toBeTruthy();
  });

  it("puts the server's refusals beside their fields", async () => {
    openRegister(({ path }) =>
      path === "people/matches"
        ? noMatch
        : {
            status: 422,
            body: { code: "invalid", errors: [{ path: "onsetDate", code: "in_future" }] },
          },
    );
    const user = userEvent.setup();
    await user.type(screen.getByLabelText("Onset of illness"), "2026-05-30");
    await user.click(screen.getByRole("button", { name: "Register" }));
    expect(await screen.findByText("In the future")).toBeTruthy();
    expect(screen.getByLabelText("Onset of illness").getAttribute("aria-invalid")).toBe("true");
  });

  it("refuses by the contract before anything is sent", async () => {
    const { sent } = openRegister(() => noMatch);
    const user = userEvent.setup();
    await user.type(screen.getByLabelText("E-mail"), "no address");
    await user.click(screen.getByRole("button", { name: "Register" }));
    expect(await screen.findByText("Not an e-mail address")).toBeTruthy();
    expect(sent.filter((one) => one.path === "people")).toEqual([]);
  });

  it("offers people in sight who look the same", async () => {
    const match = {
      personId,
      studyNumber: "BBB-0002",
      name: "Ada Invented",
      phoneLast2: "42",
      ageBand: null,
      area: "Quayside",
      classification: "contact",
      matchedOn: ["sound"],
    };
    const { sent } = openRegister(() => ({ body: { items: [match] } }));
    const user = userEvent.setup();
    await user.type(screen.getByLabelText("Name"), "Adda Invented");
    const link = await screen.findByRole("link", { name: "Ada Invented" });
    expect(link.getAttribute("href")).toBe(`${trace}/people/${personId}`);
    expect(screen.getByText(/same sound of the name/)).toBeTruthy();
    expect(sent.every((one) => one.path === "people/matches" && one.method === "POST")).toBe(true);
  });
});

const record = {
  id: personId,
  studyNumber: "AAA-0001",
  version: 4,
  recordedAt: "2026-05-20T08:00:00Z",
  name: "Ada Invented",
  ageBand: null,
  sex: null,
  area: null,
  householdNumber: null,
  classification: "confirmed",
  becameCase: false,
  onsetDate: "2026-05-18",
  reportDate: null,
  isolationDate: null,
  outcome: null,
  outcomeDate: null,
  windows: { infectious: null, source: null },
  monitoring: null,
  classifications: [],
  pairs: [],
  groupExposures: [],
  attempts: [],
  can: { edit: true, interview: true, addTest: true },
};

function openRecord(answer: Answer) {
  return renderDesk(
    [{ path: "/p", element: <PersonRecord personId={personId} tests={() => null} /> }],
    "/p",
    { role: "tracer", answer },
  );
}

async function changeOnset(day: string) {
  const user = userEvent.setup();
  await user.click(await screen.findByRole("button", { name: "Change Illness" }));
  const box = await screen.findByLabelText("Onset of illness");
  await user.clear(box);
  await user.type(box, day);
  await user.click(screen.getByRole("button", { name: "Save" }));
  return user;
}

describe("changing a record in place", () => {
  it("sends only what was changed, with the version it began with", async () => {
    const { sent } = openRecord(({ method }) =>
      method === "PATCH"
        ? { body: { ...record, onsetDate: "2026-05-16", version: 5 } }
        : { body: record },
    );
    await changeOnset("2026-05-16");
    const illness = screen.getByRole("region", { name: "Illness" });
    expect(await within(illness).findByText(/16 May 2026|May 16, 2026/)).toBeTruthy();
    expect(sent.find((one) => one.method === "PATCH")?.body).toEqual({
      version: 4,
      onsetDate: "2026-05-16",
    });
  });

  it("shows both values when somebody saved first, and can save over them", async () => {
    let saved = false;
    const { sent } = openRecord(({ method, body }) => {
      if (method !== "PATCH") {
        return { body: saved ? { ...record, onsetDate: "2026-05-20", version: 5 } : record };
      }
      saved = true;
      const { version } = body as { version: number };
      return version === 5
        ? { body: { ...record, onsetDate: "2026-05-16", version: 6 } }
        : { status: 409, body: { code: "stale_version" } };
    });
    const user = await changeOnset("2026-05-16");
    const table = await screen.findByRole("table", { name: "The fields you changed" });
    await waitFor(() => expect(within(table).getByText("2026-05-20")).toBeTruthy());
    expect(within(table).getByText("2026-05-18")).toBeTruthy();
    expect(within(table).getByText("2026-05-16")).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Save mine over it" }));
    await waitFor(() => expect(screen.queryByText("The fields you changed")).toBeNull());
    expect(sent.filter((one) => one.method === "PATCH").map((one) => one.body)).toEqual([
      { version: 4, onsetDate: "2026-05-16" },
      { version: 5, onsetDate: "2026-05-16" },
    ]);
  });

  it("offers no change where the record says that there is none to make", async () => {
    openRecord(() => ({ body: { ...record, name: undefined, can: {} } }));
    expect(await screen.findByRole("heading", { level: 1, name: "AAA-0001" })).toBeTruthy();
    expect(screen.queryByRole("button", { name: /Change/ })).toBeNull();
    expect(screen.queryByRole("link", { name: "Interview" })).toBeNull();
  });

  it("treats a record that is absent and one that is out of sight alike", async () => {
    openRecord(() => ({ status: 404, body: { code: "not_found" } }));
    expect(await screen.findByText("Not on record, or not assigned to you")).toBeTruthy();
  });
});
