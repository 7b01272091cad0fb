// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import type { FieldPolicy } from "../../shared/contracts/safeguard.ts";
import { Component } from "../../src/app/routes/safeguard-route.tsx";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { disagreementWords } from "../../src/features/safeguard/policy-disagreements.ts";
import { ids } from "./support/network-answers.ts";
import { type Answers, renderRoom } from "./support/room.tsx";

afterEach(cleanup);

const everyRole = (
  tracer: string,
  supervisor: string,
  epidemiologist: string,
  officer: string,
) => ({
  tracer,
  supervisor,
  epidemiologist,
  officer,
});

type Item = FieldPolicy["items"][number];

function item(over: Partial<Item>): Item {
  return {
    table: "core.person",
    column: "occupation",
    key: "occupation",
    class: "quasi",
    retention: "investigation",
    registry: everyRole("full", "full", "full", "none"),
    catalogue: everyRole("full", "full", "full", "none"),
    agrees: true,
    ...over,
  };
}

const phone = item({
  table: "identity.person",
  column: "phone_cipher",
  key: "phone",
  class: "direct",
  registry: everyRole("full", "full", "none", "masked"),
  catalogue: everyRole("full", "full", "none", "masked"),
});
const version = item({ column: "version", key: "version", class: "operational" });
const leaking = item({ catalogue: everyRole("full", "full", "full", "full"), agrees: false });

const accountId = ids.small;
const event = {
  id: ids.investigation,
  at: "2026-05-27T08:30:00.000Z",
  accountId,
  displayName: "Ada Field",
  role: "tracer",
  action: "person.opened",
  fields: ["name", "phone"],
  personIds: [ids.small, ids.large],
  studyNumbers: ["AAA-1111", "BBB-2222"],
  counts: {},
};
const member = {
  id: ids.large,
  accountId,
  displayName: "Ada Field",
  email: "ada@test.example",
  role: "tracer",
  team: null,
  since: "2026-05-01T08:00:00.000Z",
  endsOn: null,
  endedAt: null,
  version: 1,
};

function listOf(items: unknown[]) {
  return { items, total: items.length, page: 1, pageSize: 50 };
}

function open(options: { items?: Item[]; at?: string; role?: "officer" | "supervisor" } = {}) {
  const { items = [phone, item({}), version], at = "/room", role = "officer" } = options;
  const answers: Answers = (path, query) => {
    if (path === "field-policy") {
      return { items, disagreements: items.filter((one) => !one.agrees).length };
    }
    if (path === "access-events") return listOf([event]);
    if (path.startsWith("members/")) return new Response(null, { status: 204 });
    if (path !== "members" || query.get("show") === "past") return listOf([]);
    return listOf([member]);
  };
  const room = () => (
    <ToastProvider>
      <Component />
    </ToastProvider>
  );
  const session = { actingRole: role, accountId: ids.investigation };
  return renderRoom({ room, at, rooms: ["trace", "safeguard"], answers, session });
}

describe("field policy", () => {
  it("says in one line that registry and database agree, and shows both per role", async () => {
    open();
    await screen.findByText("They agree.");
    expect(screen.getByText(/the same of all 3 columns/)).toBeTruthy();
    const table = screen.getByRole("table", { name: "Says who somebody is" });
    const row = within(table).getByRole("row", { name: /^phone identity\.person\.phone_cipher/ });
    const words = within(row)
      .getAllByRole("cell")
      .map((cell) => cell.textContent);
    expect(words).toEqual(["full", "full", "full", "full", "none", "none", "masked", "masked"]);
    expect(screen.queryByText("core.person.version")).toBeNull();
  });

  it("puts what differs on top in words and marks it for readers", async () => {
    open({ items: [phone, leaking] });
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("1 column differs.");
    expect(alert.textContent).toContain(
      "Data officer: the registry says none, the database gives full.",
    );
    expect(screen.getByText("differs from the registry")).toBeTruthy();
  });

  it("finds a field and shows the house's own columns when asked", async () => {
    const user = userEvent.setup();
    open();
    await screen.findByText("They agree.");
    await user.selectOptions(screen.getByLabelText("Show"), "all columns");
    expect(screen.getByRole("table", { name: "Runs the house" })).toBeTruthy();
    await user.type(screen.getByLabelText("Find a field or column"), "phone");
    expect(screen.queryByRole("table", { name: "Runs the house" })).toBeNull();
    await user.type(screen.getByLabelText("Find a field or column"), "x");
    expect(screen.getByText("No column fits")).toBeTruthy();
  });

  it("has words for every kind of difference", () => {
    const absent = everyRole("absent", "absent", "absent", "absent");
    expect(disagreementWords(item({ catalogue: absent }))[0]).toMatch(/has no such column/);
    const direct = { ...phone, catalogue: { ...phone.catalogue, tracer: "direct" } };
    expect(disagreementWords(direct)).toEqual([
      "Contact tracer: the registry says full, the database lets it read the stored table itself.",
    ]);
    const unlisted = item({
      class: "unlisted",
      catalogue: everyRole("none", "full", "none", "none"),
    });
    expect(disagreementWords(unlisted)[0]).toMatch(/open to: supervisor\.$/);
  });
});

describe("access events", () => {
  it("tells who, as what, what, which fields and which people by study number", async () => {
    open({ at: "/room?tab=events" });
    const table = await screen.findByRole("table", { name: "Access events, newest first" });
    const row = within(table).getByRole("row", { name: /Ada Field/ });
    expect(row.textContent).toMatch(/Contact tracer.*opened a person.*name, phone/);
    const link = within(row).getByRole("link", { name: "BBB-2222" });
    expect(link.getAttribute("href")).toBe(`/i/${ids.investigation}/trace/people/${ids.large}`);
  });

  it("filters by person, action and account, each from the first page", async () => {
    const user = userEvent.setup();
    const { asked } = open({ at: "/room?tab=events" });
    await screen.findByRole("table", { name: "Access events, newest first" });
    await user.selectOptions(screen.getByLabelText("What"), "opened a person");
    await user.selectOptions(screen.getByLabelText("Who"), "Ada Field");
    await user.type(screen.getByLabelText("Person"), "AAA-1111");
    await waitFor(() =>
      expect(asked.at(-1)).toBe(
        `access-events?page=1&pageSize=50&action=person.opened&accountId=${accountId}&q=AAA-1111`,
      ),
    );
  });
});

describe("members", () => {
  it("asks before a membership ends, then ends that one", async () => {
    const user = userEvent.setup();
    const { asked } = open({ at: "/room?tab=members" });
    await user.click(
      await screen.findByRole("button", { name: "End the role of Ada Field as contact tracer" }),
    );
    const dialog = await screen.findByRole("alertdialog", { name: "End Ada Field’s role here?" });
    expect(asked.some((one) => one.startsWith("DELETE"))).toBe(false);
    await user.click(within(dialog).getByRole("button", { name: "End the membership" }));
    await screen.findByText("Membership of Ada Field ended");
    expect(asked).toContain(`DELETE members/${member.id}`);
  });

  it("checks the form of a new member before anything is sent", async () => {
    const user = userEvent.setup();
    const { asked } = open({ at: "/room?tab=members" });
    await user.click(await screen.findByRole("button", { name: "Add a member" }));
    await user.type(screen.getByLabelText("E-mail of the account"), "nobody");
    await user.click(screen.getByRole("button", { name: "Add the member" }));
    await screen.findByText("Not an e-mail address");
    expect(asked.some((one) => one.startsWith("POST"))).toBe(false);
    await user.type(screen.getByLabelText("E-mail of the account"), "@test.example");
    await user.selectOptions(screen.getByLabelText("Role here"), "Epidemiologist");
    await user.click(screen.getByRole("button", { name: "Add the member" }));
    await waitFor(() => expect(asked).toContain("POST members"));
  });
});

it("is not open to another role, and asks the server nothing", () => {
  const { asked } = open({ role: "supervisor" });
  expect(screen.getByText("Not open to the role you act in")).toBeTruthy();
  expect(asked).toEqual([]);
});
