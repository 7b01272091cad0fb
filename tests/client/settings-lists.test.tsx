// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import {
  ask,
  bodyOf,
  box,
  button,
  openSettings,
  previewShown,
  retype,
} from "./support/settings-desk.tsx";

// One page of forty boxes, typed into key by key.
vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

describe("lists", () => {
  const symptoms = () =>
    screen.getAllByLabelText<HTMLInputElement>(/^Symptom \d/).map(({ value }) => value);

  it("adds, names anew, orders and removes symptoms by keyboard", async () => {
    const { user, sent } = await openSettings();
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
    const { user, sent } = await openSettings();
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
    const { user, sent } = await openSettings();
    await user.clear(box("Symptom 3"));
    await user.click(button(ask));
    await waitFor(() => expect(box("Symptom 3").getAttribute("aria-invalid")).toBe("true"));
    expect(screen.getByText("Needed")).toBeTruthy();
    expect(sent).toEqual([]);
  });

  it("adds a text by language, checks the tag, and removes one", async () => {
    const { user, sent } = await openSettings();
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
    const { user } = await openSettings();
    const group = screen.getByRole("region", { name: "Exposure grading" });
    await user.click(within(group).getByRole("checkbox", { name: "school" }));
    await retype(user, /^At least this long/, "20");
    expect(group.textContent).toContain(
      "High-risk: direct physical contact, any exposure in the setting household or school or " +
        "at least 20 min no further apart than 2 m.",
    );
  });

  it("draws the windows of the numbers as typed, with their days as a table", async () => {
    const { user } = await openSettings();
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
    const { user } = await openSettings();
    expect(screen.getByText(/twice the longest incubation: 28 days/)).toBeTruthy();
    await retype(user, /^Longest incubation/, "21");
    expect(screen.getByText(/twice the longest incubation: 42 days/)).toBeTruthy();
  });
});
