// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it, vi } from "vitest";
import type { Settings } from "../../shared/contracts/settings.ts";
import type { Role } from "../../shared/roles.ts";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { Component } from "../../src/features/settings/routes/settings-route.tsx";
import { renderRoom } from "./support/room.tsx";
import {
  changesAnswer,
  definitionsAnswer,
  previewAnswer,
  settingsOf,
} from "./support/settings-answers.ts";

// One page of forty boxes, typed into key by key.
vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

const problem = (status: number, code: string, errors?: unknown[]) =>
  new Response(JSON.stringify({ type: "about:blank", title: code, status, code, errors }), {
    status,
    headers: { "content-type": "application/problem+json" },
  });

type Options = {
  role?: Role;
  settings?: Partial<Settings>;
  preview?: () => unknown;
  /** The answer to a save, given what is saved so far. */
  save?: (body: Record<string, unknown>) => unknown;
  reset?: () => unknown;
};

/** Opens the page on a server of its own: `sent` holds the bodies, `store` what is saved. */
async function open(options: Options = {}) {
  const { role = "supervisor", preview = () => previewAnswer } = options;
  const store = { saved: settingsOf(options.settings) };
  const sent: { path: string; body: unknown }[] = [];
  const room = renderRoom({
    room: () => (
      <ToastProvider>
        <Component />
      </ToastProvider>
    ),
    at: "/room",
    rooms: ["trace", "review"],
    session: { actingRole: role },
    answers(path, _query, { method, body }) {
      if (method !== "GET") sent.push({ path, body });
      if (path === "settings/preview") return preview();
      if (path === "settings/changes") return changesAnswer;
      if (path === "settings/case-definitions") return definitionsAnswer;
      if (path === "settings/practice-reset") return options.reset?.() ?? store.saved;
      if (path === "settings" && method === "PATCH") {
        const answer = options.save?.(body as Record<string, unknown>);
        if (answer) return answer;
        store.saved = { ...store.saved, ...(body as object), version: store.saved.version + 1 };
      }
      return store.saved;
    },
  });
  await screen.findByRole("region", { name: "Windows" });
  return { ...room, sent, store, user: userEvent.setup() };
}

// By label and by text: a search by role weighs the whole page, at every call.
const box = (label: RegExp | string) =>
  screen.getByLabelText<HTMLInputElement>(label, { selector: "input,textarea" });
const buttons = (name: string) =>
  [...document.querySelectorAll("button")].filter(
    (one) => one.textContent?.replace(/^[↑↓]/, "").trim() === name,
  );

function button(name: string): HTMLButtonElement {
  const [found, ...others] = buttons(name);
  if (!found || others.length > 0) throw new Error(`${others.length + 1} or no button: ${name}`);
  return found;
}

const ask = "See what would move";

/** The heading of a preview that has come. */
const previewShown = () => screen.findByText("What would move", { selector: "h2" });
const monitoring = () => box(/^Monitoring period/);

function bodyOf(sent: { body: unknown } | undefined): Settings {
  expect(sent).toBeDefined();
  return sent?.body as Settings;
}

async function retype(user: ReturnType<typeof userEvent.setup>, name: RegExp, text: string) {
  await user.clear(box(name));
  if (text !== "") await user.type(box(name), text);
}

describe("changing settings", () => {
  it("saves only after the preview of exactly these values, and exactly those", async () => {
    const { user, sent } = await open();
    expect(buttons("Save")).toEqual([]);
    await retype(user, /^Monitoring period/, "21");
    expect(screen.getByText("1 change not saved.")).toBeTruthy();
    expect(button("Save").disabled).toBe(true);

    await user.click(button(ask));
    const table = await screen.findByRole("table", { name: "What the change would move" });
    const rows = within(table).getAllByRole("row").slice(1);
    expect(rows.map((row) => row.textContent)).toEqual([
      "Monitoring periodcontacts due today21230593 more",
      "Monitoring periodfollow-ups at their end640640stays",
    ]);
    expect(document.activeElement?.textContent).toBe("What would move");
    expect(button("Save").disabled).toBe(false);

    // One more change, and what was shown is not what would be saved.
    await retype(user, /^Lost after/, "4");
    expect(button("Save").disabled).toBe(true);
    expect(screen.queryByRole("table", { name: "What the change would move" })).toBeNull();
    expect(screen.getByText(/Changed since you looked/)).toBeTruthy();
    await user.click(button(ask));
    await screen.findByText("Nothing that is counted moves with Lost after.");
    await user.click(button("Save"));
    await screen.findByText("Settings saved.");
    const body = { version: 4, monitoringDays: 21, lostAfterDays: 4 };
    expect(sent).toEqual([
      { path: "settings/preview", body: { version: 4, monitoringDays: 21 } },
      { path: "settings/preview", body },
      { path: "settings", body },
    ]);
    expect(screen.queryByText(/not saved\./)).toBeNull();
    expect(monitoring().value).toBe("21");
  });

  it("puts one setting back, or all", async () => {
    const { user, sent } = await open();
    await retype(user, /^Monitoring period/, "21");
    await retype(user, /^Name/, "North shore");
    expect(screen.getByText("2 changes not saved.")).toBeTruthy();
    await user.click(button("Put back Monitoring period"));
    expect(monitoring().value).toBe("14");
    expect(box(/^Name/).value).toBe("North shore");
    await user.click(button("Put all back"));
    expect(box(/^Name/).value).toBe("Sallow Bay");
    expect(screen.queryByText(/not saved\./)).toBeNull();
    expect(sent).toEqual([]);
  });

  it("says beside the field what does not fit, and asks the server nothing", async () => {
    const { user, sent } = await open();
    await retype(user, /^Monitoring period/, "soon");
    await retype(user, /^Shortest incubation/, "15");
    await user.click(button(ask));
    const shortest = box(/^Shortest incubation/);
    await waitFor(() => expect(document.activeElement).toBe(monitoring()));
    expect(monitoring().getAttribute("aria-invalid")).toBe("true");
    const words = (input: HTMLElement) =>
      document.getElementById(`${input.id}-error`)?.textContent ?? "";
    expect(words(monitoring())).toContain("Not a number");
    await retype(user, /^Monitoring period/, "21");
    await user.click(button(ask));
    await waitFor(() =>
      expect(words(shortest)).toContain("The largest number is below the smallest"),
    );
    expect(sent).toEqual([]);
  });

  it("shows what the server refuses beside its field and keeps what was typed", async () => {
    const errors = [{ path: "timeZone", code: "not_a_zone" }];
    const { user } = await open({ preview: () => problem(422, "invalid", errors) });
    await retype(user, /^Monitoring period/, "21");
    await user.click(button(ask));
    await screen.findByText("Not a time zone");
    expect(monitoring().value).toBe("21");
    expect(button("Save").disabled).toBe(true);
  });

  it("warns that a new version of the case definition will be made", async () => {
    const { user, sent } = await open({
      preview: () => ({ moves: [], newCaseDefinition: true }),
    });
    await user.click(box("probable case asks for a positive test"));
    await user.click(button(ask));
    await screen.findByText(/Saving makes version 3\. Classifications keep the version/);
    expect(sent[0]?.body).toMatchObject({
      version: 4,
      caseRules: { probable: { laboratory: true, clinical: true, link: true } },
    });
  });
});

describe("somebody else saves first", () => {
  it("keeps what was typed, shows both, and asks again before it saves", async () => {
    let first = true;
    const { user, sent, store } = await open({
      save() {
        if (!first) return null;
        first = false;
        store.saved = { ...store.saved, monitoringDays: 10, lostAfterDays: 5, version: 5 };
        return problem(409, "stale_version");
      },
    });
    await retype(user, /^Monitoring period/, "21");
    await user.click(button(ask));
    await screen.findByRole("table", { name: "What the change would move" });
    await user.click(button("Save"));

    const table = await screen.findByRole("table", { name: "Settings that either of you changed" });
    const rows = within(table).getAllByRole("row").slice(1);
    expect(rows.map((row) => row.textContent)).toEqual([
      "Monitoring period14 days10 days21 daysTake saved Monitoring period",
      "Lost after3 due days in a row5 due days in a rowas saved",
    ]);
    // Typed stays typed; what was not touched follows what is saved.
    expect(monitoring().value).toBe("21");
    expect(box(/^Lost after/).value).toBe("5");
    expect(button("Save").disabled).toBe(true);

    await user.click(button(ask));
    await screen.findByRole("table", { name: "What the change would move" });
    await user.click(button("Save"));
    await screen.findByText("Settings saved.");
    expect(sent.at(-1)).toEqual({ path: "settings", body: { version: 5, monitoringDays: 21 } });
  });

  it("takes the saved value where that is wanted", async () => {
    const { user, store } = await open({
      preview: () => {
        store.saved = { ...store.saved, monitoringDays: 10, version: 5 };
        return problem(409, "stale_version");
      },
    });
    await retype(user, /^Monitoring period/, "21");
    await user.click(button(ask));
    await screen.findByText("Someone else saved the settings first");
    await user.click(button("Take saved Monitoring period"));
    expect(monitoring().value).toBe("10");
    expect(screen.queryByText(/not saved\./)).toBeNull();
  });
});

describe("lists", () => {
  const symptoms = () =>
    screen.getAllByLabelText<HTMLInputElement>(/^Symptom \d/).map(({ value }) => value);

  it("adds, names anew, orders and removes symptoms by keyboard", async () => {
    const { user, sent } = await open();
    await user.type(box("New symptom"), "Stiff neck{Enter}");
    expect(symptoms()).toEqual(["Fever", "Rash", "Cough", "Sore throat", "Stiff neck"]);
    await user.type(box("New symptom"), "rash{Enter}");
    expect(screen.getByText("Already in this list")).toBeTruthy();
    expect(symptoms()).toHaveLength(5);
    await user.clear(box("New symptom"));

    button("Move Rash up").focus();
    await user.keyboard("{Enter}");
    expect(symptoms().slice(0, 2)).toEqual(["Rash", "Fever"]);
    // At the head there is no further up, so the focus stays on the same row.
    expect(document.activeElement).toBe(button("Move Rash down"));
    await user.click(button("Remove Cough"));
    await retype(user, /^Symptom 2/, "High fever");
    expect(symptoms()).toEqual(["Rash", "High fever", "Sore throat", "Stiff neck"]);

    await user.click(button(ask));
    await previewShown();
    expect(sent[0]?.body).toEqual({
      version: 4,
      symptoms: [
        { code: "rash", label: "Rash" },
        { code: "fever", label: "High fever" },
        { code: "sore_throat", label: "Sore throat" },
        { code: "stiff_neck", label: "Stiff neck" },
      ],
    });
  });

  it("gives a symptom that comes back its own code again, and never a code twice", async () => {
    const { user, sent } = await open();
    await user.click(button("Remove Rash"));
    await retype(user, /^Symptom 1/, "Heat");
    await user.type(box("New symptom"), "Fever{Enter}");
    await user.type(box("New symptom"), "Rash{Enter}");
    await user.type(box("New symptom"), "Жар{Enter}");
    await user.click(button(ask));
    await previewShown();
    expect(bodyOf(sent[0]).symptoms.map(({ code }) => code)).toEqual([
      "fever",
      "cough",
      "sore_throat",
      "fever_2",
      "rash",
      "symptom_1",
    ]);
  });

  it("refuses a symptom without a label beside it", async () => {
    const { user, sent } = await open();
    await user.clear(box("Symptom 3"));
    await user.click(button(ask));
    await waitFor(() => expect(box("Symptom 3").getAttribute("aria-invalid")).toBe("true"));
    expect(screen.getByText("Needed")).toBeTruthy();
    expect(sent).toEqual([]);
  });

  it("adds a text by language, checks the tag, and removes one", async () => {
    const { user, sent } = await open();
    await user.type(box("Language"), "not a tag{Enter}");
    expect(screen.getByText("Not valid")).toBeTruthy();
    await user.clear(box("Language"));
    await user.type(box("Language"), "EN{Enter}");
    expect(screen.getByText("Already in this list")).toBeTruthy();
    await user.clear(box("Language"));
    await user.type(box("Language"), "pt-br");
    await user.click(button("Add a language"));
    const added = box(/^Advice in .*pt-BR$/);
    expect(document.activeElement).toBe(added);
    expect(added.getAttribute("lang")).toBe("pt-BR");
    await user.type(added, "Fique em casa.");
    await user.click(button("Remove Consent in Arabic"));
    await user.click(button(ask));
    await previewShown();
    expect(bodyOf(sent[0]).texts).toEqual([
      { kind: "advice", language: "en", text: "Stay at home and ring us if you feel unwell." },
      { kind: "advice", language: "pt-BR", text: "Fique em casa." },
    ]);
  });
});

describe("what a value means", () => {
  it("builds the sentence of the grading from what is typed", async () => {
    const { user } = await open();
    const group = screen.getByRole("region", { name: "Exposure grading" });
    await user.click(within(group).getByRole("checkbox", { name: "school" }));
    await retype(user, /^At least this long/, "20");
    expect(group.textContent).toContain(
      "High-risk: direct physical contact, any exposure in the setting household or school or " +
        "at least 20 min no further apart than 2 m.",
    );
  });

  it("draws the windows of the numbers as typed, with their days as a table", async () => {
    const { user } = await open();
    await retype(user, /^Longest incubation/, "21");
    const example = screen.getByRole("figure", { name: "Example: windows around an onset" });
    await user.click(within(example).getByRole("button"));
    const table = screen.getByRole("table", { name: "Example: windows around an onset" });
    // Onset on 27 May: 21 days before is the 6th, 2 days before the 25th.
    expect(within(table).getAllByRole("row")[1]?.textContent).toMatch(
      /source window.*6 May 2026|source window.*May 6, 2026/,
    );
    await retype(user, /^Longest incubation/, "x");
    await screen.findByText(/drawn once all five numbers can be read/);
  });

  it("says what a blank closure stands for", async () => {
    const { user } = await open();
    expect(screen.getByText(/twice the longest incubation: 28 days/)).toBeTruthy();
    await retype(user, /^Longest incubation/, "21");
    expect(screen.getByText(/twice the longest incubation: 42 days/)).toBeTruthy();
  });
});

describe("what was before", () => {
  it("tells who changed what, when, from what to what", async () => {
    await open();
    const table = await screen.findByRole("table", { name: /^Changes of the settings/ });
    const rows = within(table).getAllByRole("row").slice(1);
    expect(rows[0]?.textContent).toMatch(/Ada Field.*Closure42 days without a new casetwice/);
    expect(rows[1]?.textContent).toMatch(/^Symptoms to ask aboutremoved Breathlessness, /);
    expect(rows[2]?.textContent).toMatch(/not shown.*Longest incubation10 days14 days/);
  });

  it("pages through the changes", async () => {
    const { user, asked } = await open();
    const pages = await screen.findByRole("navigation", { name: "Pages of changes" });
    await user.click(within(pages).getByRole("button", { name: "Next" }));
    await waitFor(() => expect(asked).toContain("settings/changes?page=2&pageSize=20"));
  });

  it("lists the versions of the case definition", async () => {
    await open();
    const table = await screen.findByRole("table", { name: "Versions of the case definition" });
    expect(within(table).getByRole("row", { name: /Rash of any kind/ })).toBeTruthy();
  });
});

describe("roles that only read", () => {
  it("see the values as words and no box", async () => {
    await open({ role: "epidemiologist" });
    expect(screen.queryAllByRole("textbox")).toEqual([]);
    expect(screen.queryAllByRole("checkbox")).toEqual([]);
    const clusters = screen.getByRole("region", { name: "Clusters" });
    expect(clusters.textContent).toContain("twice the longest incubation (28 days)");
    expect(screen.getByText("Stay at home and ring us if you feel unwell.")).toBeTruthy();
    expect(screen.getByText(/Supervisors and data officers change them/)).toBeTruthy();
  });

  it("do not ask for the history as a tracer, whom the server would refuse", async () => {
    const { asked } = await open({ role: "tracer" });
    expect(screen.queryByRole("region", { name: "History of changes" })).toBeNull();
    expect(asked.some((one) => one.startsWith("settings/changes"))).toBe(false);
  });
});

describe("practice", () => {
  const empty = "Empty and fill anew";

  it("is emptied by a supervisor who types its name", async () => {
    const { user, sent } = await open({ settings: { practice: true } });
    await user.click(button(empty));
    const dialog = await screen.findByRole("alertdialog", {
      name: "Empty Sallow Bay and fill it anew?",
    });
    await user.type(within(dialog).getByRole("textbox"), "Sallow");
    await user.click(within(dialog).getByRole("button", { name: empty }));
    expect(within(dialog).getByText("Not the name of this investigation")).toBeTruthy();
    expect(sent).toEqual([]);
    await user.type(within(dialog).getByRole("textbox"), " Bay");
    await user.click(within(dialog).getByRole("button", { name: empty }));
    await screen.findByText("Emptied and filled anew.");
    expect(sent).toEqual([
      { path: "settings/practice-reset", body: { version: 4, name: "Sallow Bay" } },
    ]);
    expect(screen.queryByRole("alertdialog")).toBeNull();
  });

  it("says in the dialog why it was not emptied, and can be left as it is", async () => {
    const { user } = await open({
      settings: { practice: true },
      reset: () => problem(409, "stale_version"),
    });
    await user.click(button(empty));
    const dialog = await screen.findByRole("alertdialog");
    await user.type(within(dialog).getByRole("textbox"), "Sallow Bay{Enter}");
    await within(dialog).findByText(/Someone changed this record meanwhile/);
    await user.click(within(dialog).getByRole("button", { name: "Keep as it is" }));
    expect(screen.queryByRole("alertdialog")).toBeNull();
  });

  it("offers it to nobody else, and not for real work", async () => {
    await open({ settings: { practice: true }, role: "officer" });
    expect(buttons(empty)).toEqual([]);
    expect(screen.getByText("A supervisor can empty it and fill it anew.")).toBeTruthy();
    cleanup();
    await open();
    expect(buttons(empty)).toEqual([]);
  });
});
