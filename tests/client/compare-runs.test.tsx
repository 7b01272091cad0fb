// @vitest-environment jsdom
import { cleanup, configure, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeAll, describe, expect, it } from "vitest";
import { Component as Room } from "../../src/features/compare/routes/compare-route.tsx";
import { Component as RunPage } from "../../src/features/compare/routes/compare-run-route.tsx";
import { runForm, startValues } from "../../src/features/compare/run-form-values.ts";
import { itemOf, listAnswer, resultOf, runIds, runOf } from "./support/compare-answers.ts";
import { ids, summaryOf } from "./support/network-answers.ts";
import { type Answers, renderRoom } from "./support/room.tsx";

afterEach(cleanup);
// Rows, forms and plots come in parts; a busy machine takes its time with each.
configure({ asyncUtilTimeout: 8_000 });
// The drawing library is fetched with the first plot, which takes longer than one may wait here.
beforeAll(async () => {
  await import("../../src/features/compare/components/run-curves.tsx");
  await import("../../src/features/compare/components/run-row-detail.tsx");
  await import("../../src/features/compare/components/run-form.tsx");
});

const openRoom = (answers: Answers) =>
  renderRoom({
    room: Room,
    at: "/room",
    rooms: ["review", "compare"],
    answers: (path, query, request) =>
      path.startsWith("compare/") ? answers(path, query, request) : summaryOf(),
  });

const openRun = (answers: Answers, at = `/i/x/compare/runs/${runIds.one}`) =>
  renderRoom({
    room: RunPage,
    near: true,
    path: "/i/:id/compare/runs/:runId",
    at,
    rooms: ["compare"],
    answers,
  });

const rowOf = (table: HTMLElement, name: RegExp) => within(table).getByRole("row", { name });

describe("comparisons in the room", () => {
  it("are listed with name, when, who, cut-off, people, replicates and state", async () => {
    openRoom(() =>
      listAnswer([
        itemOf(),
        itemOf({ id: runIds.other, name: "Quick", replicates: 9999, reached: 640 }),
        itemOf({ id: runIds.fresh, name: "Broken", state: "failed" }),
      ]),
    );
    const table = await screen.findByRole("table", { name: /^Comparisons/ });
    const row = rowOf(table, /^Week 22/);
    for (const text of [
      "ready",
      "May 27, 2026, 18:01",
      "E. Epi",
      "all people on record",
      "34",
      "999",
    ]) {
      expect(row.textContent).toContain(text);
    }
    expect(rowOf(table, /^Quick/).textContent).toContain("ready, time ran out");
    expect(rowOf(table, /^Quick/).textContent).toContain("640 of 9,999");
    expect(rowOf(table, /^Broken/).textContent).toContain("failed");
  });

  it("show what is being worked out with its progress, and stop it", async () => {
    const user = userEvent.setup();
    let state: "running" | "cancelled" = "running";
    const { asked } = openRoom((path, _query, { method }) => {
      if (method === "POST") {
        expect(path).toBe(`compare/runs/${runIds.one}/cancel`);
        state = "cancelled";
        return { id: runIds.one };
      }
      return listAnswer([itemOf({ state, progress: 0.42, reached: 420 })]);
    });
    const bar = await screen.findByRole("progressbar", { name: "Week 22" });
    expect(bar.getAttribute("aria-valuenow")).toBe("42");
    expect(bar.getAttribute("aria-valuetext")).toContain("420 of 999");
    await user.click(screen.getByRole("button", { name: /^Cancel ?Week 22$/ }));
    await waitFor(() => expect(screen.queryByRole("progressbar")).toBeNull());
    expect(asked).toContain(`POST compare/runs/${runIds.one}/cancel`);
    expect(screen.getByRole("row", { name: /^Week 22/ }).textContent).toContain("cancelled");
  });

  it("say so when there is none, and when they cannot be loaded", async () => {
    openRoom(() => listAnswer([]));
    expect(await screen.findByText("No comparison was asked for yet")).toBeTruthy();
    cleanup();
    openRoom(() => new Response("{}", { status: 500 }));
    expect(await screen.findByText("This could not be loaded")).toBeTruthy();
  });

  it("are asked for by a form that the contract checks, and open when asked", async () => {
    const user = userEvent.setup();
    const sent: unknown[] = [];
    openRoom((_path, _query, { method, body }) => {
      if (method !== "POST") return listAnswer([]);
      sent.push(body);
      return { id: runIds.fresh };
    });
    await user.click(await screen.findByRole("button", { name: "New comparison" }));
    const form = await screen.findByRole("form", { name: "New comparison" });
    await user.clear(within(form).getByLabelText("Seed"));
    await user.type(within(form).getByLabelText("Seed"), "1.5");
    await user.click(within(form).getByRole("button", { name: "Compare" }));
    expect((await within(form).findByText(/Give a whole number/)).textContent).toContain("Check:");
    expect(within(form).getByLabelText(/^Name/).getAttribute("aria-invalid")).toBe("true");
    expect(sent).toEqual([]);
    await user.type(within(form).getByLabelText(/^Name/), "Week 23");
    await user.clear(within(form).getByLabelText("Seed"));
    await user.type(within(form).getByLabelText("Seed"), "12");
    await user.selectOptions(within(form).getByLabelText("Mixing by"), "household");
    await user.click(within(form).getByLabelText(/^199, a quick look/));
    await user.click(within(form).getByRole("button", { name: "Compare" }));
    expect(
      await screen.findByText(`at /i/${ids.investigation}/compare/runs/${runIds.fresh}`),
    ).toBeTruthy();
    expect(sent).toEqual([
      {
        name: "Week 23",
        population: "all",
        window: "preset",
        attribute: "household",
        replicates: 199,
        seed: 12,
      },
    ]);
  });

  it("give the keyboard back to its button when the form is closed", async () => {
    const user = userEvent.setup();
    openRoom(() => listAnswer([]));
    const opener = await screen.findByRole("button", { name: "New comparison" });
    await user.click(opener);
    const name = await screen.findByLabelText(/^Name/);
    expect(document.activeElement).toBe(name);
    await user.click(screen.getByRole("button", { name: "Close the form" }));
    expect(screen.queryByRole("form", { name: "New comparison" })).toBeNull();
    expect(document.activeElement).toBe(opener);
  });

  it("take a free range only with a day, and in order", () => {
    const start = {
      ...startValues({ population: "all", window: "free" }),
      name: "Range",
    };
    const codes = (values: object) =>
      runForm.safeParse(values).error?.issues.map(({ path, message }) => [path.join(), message]);
    expect(codes(start)).toEqual([["from", "required"]]);
    expect(codes({ ...start, from: "2026-05-20", to: "2026-05-01" })).toEqual([
      ["to", "last_before_first"],
    ]);
    const range = { ...start, from: "2026-05-01", to: "2026-05-20" };
    expect(runForm.parse(range)).toMatchObject({ from: "2026-05-01", to: "2026-05-20" });
    expect(runForm.parse(range)).not.toHaveProperty("window");
    expect(runForm.parse({ ...range, window: "all" })).not.toHaveProperty("from");
  });
});

describe("the page of a comparison", () => {
  it("first says what was seen and what may be compared, then the figures", async () => {
    openRun((path) =>
      path.endsWith(runIds.one) ? runOf({ result: resultOf("traced") }) : listAnswer([itemOf()]),
    );
    const seen = await screen.findByRole("region", { name: "What was seen" });
    expect(seen.textContent).toContain("214 of 1,036 (21%)");
    expect(seen.textContent).toContain("60%");
    expect(seen.textContent).toContain("Group exposures that could not be named are in no figure");
    const table = screen.getByRole("table", { name: "Measures against random networks" });
    expect(seen.compareDocumentPosition(table) & Node.DOCUMENT_POSITION_FOLLOWING).toBeTruthy();
    const standings = screen.getByRole("table", { name: /^Comparisons and whether/ });
    const refused = rowOf(standings, /^mean number of contact pairs on record against 1/);
    expect(refused.textContent).toContain("refused");
    expect(refused.textContent).toContain("Look at contact pairs per person");
    expect(
      rowOf(standings, /^largest connected group against random mixing/).textContent,
    ).toContain("look unlike random mixing even when they mix at random");
    expect(document.body.textContent).toContain(
      "A difference from random mixing can come from how people were traced.",
    );
    expect(document.body.textContent).toContain("Not for blame");
  });

  it("shows the lesson of the karate club: extreme at first, ordinary once degrees are kept", async () => {
    openRun((path) => (path.endsWith(runIds.one) ? runOf() : listAnswer([itemOf()])));
    const table = await screen.findByRole("table", { name: "Measures against random networks" });
    const row = rowOf(table, /^transitivity/);
    for (const text of ["0.2557", "0.1357", "0.0769–0.1963", "p ≤ 0.002", "0.2235", "either way"]) {
      expect(row.textContent).toContain(text);
    }
    expect(row.textContent).toContain(
      "higher than in random mixing; ordinary once each person's number of contact pairs is kept",
    );
    expect(rowOf(table, /^like with like by number/).textContent).toContain("-0.2620 to 0.1310");
    expect(rowOf(table, /^contact pairs/).textContent).toContain(
      "the same in every random network",
    );
  });

  it("opens a row to its plots, each with a plain sentence and a table one key away", async () => {
    const user = userEvent.setup();
    openRun((path) =>
      path.endsWith(runIds.one) ? runOf({ result: resultOf("traced") }) : listAnswer([itemOf()]),
    );
    const opener = await screen.findByRole("button", { name: "transitivity" });
    await user.click(opener);
    expect(opener.getAttribute("aria-expanded")).toBe("true");
    const figure = await screen.findByRole("figure", {
      name: "transitivity, random mixing, same interviews",
    });
    expect(figure.textContent).toContain(
      "0 of 999 random networks had a value as high: p ≤ 0.001.",
    );
    figure.focus();
    await user.keyboard("t");
    const rows = within(within(figure).getByRole("table")).getAllByRole("row");
    expect(rows).toHaveLength(1 + 13 + 1);
    expect(rows.at(-1)?.textContent).toContain("0.2557");
    expect(rows.at(-1)?.textContent).toContain("here");
    const greyed = screen.getByRole("figure", { name: "transitivity, random mixing" });
    expect(greyed.parentElement?.parentElement?.textContent).toContain("Greyed: people found by");
  });

  it("holds numbers of pairs and sizes of groups against the bands, with tables", async () => {
    const user = userEvent.setup();
    openRun((path) => (path.endsWith(runIds.one) ? runOf() : listAnswer([itemOf()])));
    const degrees = await screen.findByRole("figure", {
      name: "People by their number of contact pairs",
    });
    expect(degrees.textContent).toContain(
      "Outside the envelope of the whole curve at 16, 17 contact pairs of a person.",
    );
    expect(degrees.textContent).toContain("p = 0.01");
    await user.click(within(degrees).getByRole("button", { name: /as a table/ }));
    const table = within(degrees).getByRole("table");
    expect(
      within(table)
        .getAllByRole("columnheader")
        .map((cell) => cell.textContent),
    ).toEqual([
      "contact pairs of a person",
      "people",
      "95 % from",
      "95 % to",
      "whole curve from",
      "whole curve to",
      "binomial law",
      "Poisson law",
    ]);
    expect(rowOf(table, /^2 11 7 14 0 16/)).toBeTruthy();
    expect(rowOf(table, /^17 or more 1/)).toBeTruthy();
    const sizes = screen.getByRole("figure", {
      name: "Connected groups by their number of people",
    });
    expect(sizes.textContent).toContain("A quick look: fewer than 999 random networks.");
  });

  it("leaves the laws out where they may not be held against the record, and says why", async () => {
    openRun((path) =>
      path.endsWith(runIds.one) ? runOf({ result: resultOf("traced") }) : listAnswer([itemOf()]),
    );
    expect(await screen.findByText(/laws are left out: people found by tracing/)).toBeTruthy();
  });

  it("tells running, failed, cancelled and cut short apart", async () => {
    const states = [
      [{ state: "running", progress: 0.5, reached: 500, result: null }, "500 of 999"],
      [{ state: "failed", failure: "nonsense", result: null }, "it can be run again"],
      [{ state: "cancelled", reached: 0, result: null }, "No figures were kept."],
      [{ reached: 640 }, "640 of 999 (64%) random networks of each kind were drawn"],
    ] as const;
    for (const [changes, words] of states) {
      openRun((path) => (path.endsWith(runIds.one) ? runOf(changes) : listAnswer([])));
      await waitFor(() => expect(document.body.textContent).toContain(words));
      cleanup();
    }
  });

  it("goes on asking while it runs, until the figures are there", async () => {
    let ready = false;
    openRun((path) => {
      if (!path.endsWith(runIds.one)) return listAnswer([]);
      const now = ready ? runOf() : runOf({ state: "running", progress: 0.5, result: null });
      ready = true;
      return now;
    });
    expect(await screen.findByRole("progressbar")).toBeTruthy();
    expect(
      await screen.findByRole("table", { name: /^Measures against/ }, { timeout: 5_000 }),
    ).toBeTruthy();
  });

  it("stands beside another one, older first, with what changed", async () => {
    const other = runOf({
      id: runIds.other,
      name: "Week 23",
      cutOff: "2026-06-03T18:00:00.000Z",
      graphVersion: 1600,
    });
    const measure = other.result?.measures.find(({ statistic }) => statistic === "triangles");
    if (measure) measure.observed = 40;
    openRun((path) => {
      if (path.endsWith(runIds.one)) return runOf();
      return path.endsWith(runIds.other) ? other : listAnswer([itemOf(), itemOf(other)]);
    }, `/i/x/compare/runs/${runIds.one}?with=${runIds.other}`);
    const asked = await screen.findByRole("table", { name: /^What is different/ });
    expect(rowOf(asked, /^network version/).textContent).toBe("network version1,4821,600");
    expect(within(asked).queryByRole("row", { name: /^seed/ })).toBeNull();
    const both = screen.getByRole("table", { name: /^Measures side by side/ });
    expect(rowOf(both, /^triangles/).textContent).toContain("-5");
    expect(within(both).getAllByRole("columnheader")[1]?.textContent).toContain("this one, May 27");
  });

  it("is run again, asked of the newer record, taken out and deleted", async () => {
    const user = userEvent.setup();
    const sent: [string, unknown][] = [];
    const answers: Answers = (path, _query, { method, body }) => {
      if (method === "POST") {
        sent.push([path, body]);
        return { id: runIds.fresh };
      }
      if (method === "DELETE") {
        sent.push([path, method]);
        return new Response(null, { status: 204 });
      }
      if (path === "compare/runs") return listAnswer([itemOf()]);
      return runOf({ id: path.endsWith(runIds.fresh) ? runIds.fresh : runIds.one });
    };
    openRun(answers);
    const file = await screen.findByRole("link", { name: "Download the run" });
    expect(file.getAttribute("href")).toBe(
      `/api/investigations/${ids.investigation}/compare/runs/${runIds.one}/file`,
    );
    await user.click(screen.getByRole("button", { name: "Ask the record as it stands now" }));
    await waitFor(() => expect(sent[0]?.[0]).toBe("compare/runs"));
    expect(sent[0]?.[1]).toEqual({
      name: "Week 22",
      population: "all",
      window: "preset",
      attribute: "age_band",
      replicates: 999,
      seed: 7,
    });
    cleanup();
    openRun(answers);
    await user.click(await screen.findByRole("button", { name: "Run again" }));
    await waitFor(() => expect(sent[1]?.[0]).toBe(`compare/runs/${runIds.one}/again`));
    cleanup();
    openRun(answers);
    await user.click(await screen.findByRole("button", { name: "Delete" }));
    await user.click(screen.getByRole("button", { name: "Delete the comparison" }));
    await waitFor(() => expect(sent[2]).toEqual([`compare/runs/${runIds.one}`, "DELETE"]));
    expect(await screen.findByText(`at /i/${ids.investigation}/compare`)).toBeTruthy();
  });
});
