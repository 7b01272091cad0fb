// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import {
  ask,
  box,
  button,
  buttons,
  monitoring,
  openSettings,
  problem,
  retype,
} from "./support/settings-desk.tsx";

// One page of forty boxes, typed into key by key.
vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

describe("changing settings", () => {
  it("saves only after the preview of exactly these values, and exactly those", async () => {
    const { user, sent } = await openSettings();
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
    const { user, sent } = await openSettings();
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
    const { user, sent } = await openSettings();
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
    const { user } = await openSettings({ preview: () => problem(422, "invalid", errors) });
    await retype(user, /^Monitoring period/, "21");
    await user.click(button(ask));
    await screen.findByText("Not a time zone");
    expect(monitoring().value).toBe("21");
    expect(button("Save").disabled).toBe(true);
  });

  it("warns that a new version of the case definition will be made", async () => {
    const { user, sent } = await openSettings({
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
    const { user, sent, store } = await openSettings({
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
    const { user, store } = await openSettings({
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

describe("what was before", () => {
  it("tells who changed what, when, from what to what", async () => {
    await openSettings();
    const table = await screen.findByRole("table", { name: /^Changes of the settings/ });
    const rows = within(table).getAllByRole("row").slice(1);
    expect(rows[0]?.textContent).toMatch(/Ada Field.*Closure42 days without a new casetwice/);
    expect(rows[1]?.textContent).toMatch(/^Symptoms to ask aboutremoved Breathlessness, /);
    expect(rows[2]?.textContent).toMatch(/not shown.*Longest incubation10 days14 days/);
  });

  it("pages through the changes", async () => {
    const { user, asked } = await openSettings();
    const pages = await screen.findByRole("navigation", { name: "Pages of changes" });
    await user.click(within(pages).getByRole("button", { name: "Next" }));
    await waitFor(() => expect(asked).toContain("settings/changes?page=2&pageSize=20"));
  });

  it("lists the versions of the case definition", async () => {
    await openSettings();
    const table = await screen.findByRole("table", { name: "Versions of the case definition" });
    expect(within(table).getByRole("row", { name: /Rash of any kind/ })).toBeTruthy();
  });
});

describe("roles that only read", () => {
  it("see the values as words and no box", async () => {
    await openSettings({ role: "epidemiologist" });
    expect(screen.queryAllByRole("textbox")).toEqual([]);
    expect(screen.queryAllByRole("checkbox")).toEqual([]);
    const clusters = screen.getByRole("region", { name: "Clusters" });
    expect(clusters.textContent).toContain("twice the longest incubation (28 days)");
    expect(screen.getByText("Stay at home and ring us if you feel unwell.")).toBeTruthy();
    expect(screen.getByText(/Supervisors and data officers change them/)).toBeTruthy();
  });

  it("do not ask for the history as a tracer, whom the server would refuse", async () => {
    const { asked } = await openSettings({ role: "tracer" });
    expect(screen.queryByRole("region", { name: "History of changes" })).toBeNull();
    expect(asked.some((one) => one.startsWith("settings/changes"))).toBe(false);
  });
});

describe("practice", () => {
  const empty = "Empty and fill anew";

  it("is emptied by a supervisor who types its name", async () => {
    const { user, sent } = await openSettings({ settings: { practice: true } });
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
    const { user } = await openSettings({
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
    await openSettings({ settings: { practice: true }, role: "officer" });
    expect(buttons(empty)).toEqual([]);
    expect(screen.getByText("A supervisor can empty it and fill it anew.")).toBeTruthy();
    cleanup();
    await openSettings();
    expect(buttons(empty)).toEqual([]);
  });
});
