// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { caseId, interviewServer, openInterview, placeId } from "./support/interview-desk.tsx";

// Many keys on a busy machine.
vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

const focused = () => document.activeElement as HTMLInputElement;
const rowOf = () => focused().closest("fieldset")?.querySelector("legend")?.textContent;

describe("interview by keyboard", () => {
  it("takes twelve contacts without a pointer and records them once", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    expect(rowOf()).toBe("Contact 1");
    expect(focused().dataset.box).toBe("name");

    for (let n = 1; n <= 12; n++) {
      expect(rowOf()).toBe(`Contact ${n}`);
      if (n === 1) {
        await user.keyboard("Person 1{Tab}07700 90000{Tab}h{Tab}Gull Row 4{Tab}");
        await user.keyboard("2026-05-20{Tab}={Tab}120{Tab}1,5{Tab}y{Tab}u{Tab}sister{Enter}");
      } else {
        await user.keyboard(`Person ${n}{Control>}'{/Control}{Enter}{Enter}`);
        if (n === 3) await user.keyboard("w");
        await user.keyboard("{Control>}{Enter}{/Control}");
      }
    }
    expect(rowOf()).toBe("Contact 13");

    const outcome = screen.getByRole("combobox", { name: /Outcome/ });
    for (let steps = 0; focused() !== outcome && steps < 40; steps++) await user.tab();
    expect(focused()).toBe(outcome);
    await user.keyboard("c{Tab} ");
    const record = screen.getByRole("button", { name: "Record the interview" });
    for (let steps = 0; focused() !== record && steps < 10; steps++) await user.tab();
    await user.keyboard("{Enter}");

    await screen.findByText("another page");
    const posts = server.of("POST", "interviews");
    expect(posts).toHaveLength(1);
    const body = posts[0]?.body as { contacts: Record<string, unknown>[] };
    expect(body).toMatchObject({ personId: caseId, outcome: "complete", channel: "telephone" });
    expect(body.contacts.map(({ name }) => name)).toEqual(
      Array.from({ length: 12 }, (_, index) => `Person ${index + 1}`),
    );
    expect(body.contacts[0]).toEqual({
      personId: null,
      name: "Person 1",
      phone: "07700 90000",
      setting: "household",
      placeId: null,
      place: "Gull Row 4",
      firstExposure: "2026-05-20",
      lastExposure: "2026-05-20",
      minutes: 120,
      distanceM: 1.5,
      physical: "yes",
      indoors: "unknown",
      relation: "sister",
    });
    expect(body.contacts[2]).toMatchObject({
      setting: "workplace",
      place: "Gull Row 4",
      lastExposure: "2026-05-20",
      minutes: null,
    });
    expect(
      screen.getByText(
        /Interview recorded with 12 contacts: graph version 1,483; the group follows/,
      ),
    ).toBeTruthy();
  }, 90_000);

  it("moves between rows, takes empty rows away and keeps filled ones", async () => {
    interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada{Control>}{Enter}{/Control}Bo{Tab}0770{Alt>}{ArrowUp}{/Alt}");
    expect([rowOf(), focused().dataset.box]).toEqual(["Contact 1", "phone"]);
    await user.keyboard("{Alt>}{ArrowDown}{/Alt}{Control>}{Enter}{/Control}");
    expect(rowOf()).toBe("Contact 3");
    // A blank last row is gone back to, never doubled.
    await user.keyboard("{Control>}{Enter}{/Control}");
    expect(screen.getAllByRole("group", { name: /^Contact/ })).toHaveLength(3);
    await user.keyboard("{Control>}{Backspace}{/Control}");
    expect([rowOf(), focused().value]).toEqual(["Contact 2", "Bo"]);
    expect(screen.getAllByRole("group", { name: /^Contact/ })).toHaveLength(2);
    await user.keyboard("{Control>}{Backspace}{/Control}");
    expect(screen.getAllByRole("group", { name: /^Contact/ })).toHaveLength(2);
    await user.keyboard("{Control>}{Shift>}{Backspace}{/Shift}{/Control}");
    expect(screen.getAllByRole("group", { name: /^Contact/ })).toHaveLength(1);
    await user.click(screen.getByRole("button", { name: "Put it back" }));
    const second = screen.getByRole("group", { name: "Contact 2" });
    // The browser's own Ctrl+Backspace took the word in the name box, as everywhere else.
    expect(within(second).getByRole<HTMLInputElement>("textbox", { name: "Phone" }).value).toBe(
      "0770",
    );
  });

  it("reads days when a box is left, and marks them without refusing them", async () => {
    interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada");
    const first = screen.getByRole<HTMLInputElement>("textbox", { name: "first day of exposure" });
    for (const [typed, read] of [
      ["20", "2026-05-20"],
      ["30", "2026-04-30"],
      ["-3", "2026-05-24"],
      ["20260511", "2026-05-11"],
      ["r", "refused"],
      ["2026-04", "2026-04"],
      ["99", "99"],
    ]) {
      await user.clear(first);
      await user.type(first, `${typed}{Tab}`);
      expect(first.value).toBe(read);
    }
    await user.clear(first);
    await user.type(first, "2026-05-10{Tab}={Tab}");
    expect(
      await screen.findByText("in the source window only, not the infectious one"),
    ).toBeTruthy();
    expect(first.getAttribute("aria-invalid")).toBeNull();
    expect(first.getAttribute("aria-describedby")).toBeTruthy();
    await user.clear(first);
    await user.type(first, "2026-04-01{Tab}={Tab}");
    expect(await screen.findByText(/outside the infectious window/)).toBeTruthy();
  });

  it("lays contacts and people not named on the strip as they are typed", async () => {
    interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada{Enter}{Enter}h{Enter}{Enter}2026-05-21{Enter}={Enter}");
    await user.click(screen.getByRole("button", { name: "Add a group" }));
    await user.keyboard("t{Enter}ferry{Enter}22{Enter}={Enter}12 ±3{Tab}");
    expect(screen.getByText("between 9 and 15 people")).toBeTruthy();
    const strip = screen.getByRole("figure", { name: "Windows and contacts of D-0412" });
    strip.focus();
    await user.keyboard("t");
    const table = within(strip).getByRole("table");
    await waitFor(() => {
      expect(within(table).getByRole("row", { name: /Ada household/ })).toBeTruthy();
      expect(within(table).getByRole("row", { name: /ferry people not named: 9–15/ })).toBeTruthy();
    });
  });

  it("takes setting and id from a place on record", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada{Tab}{Tab}{Tab}tideway market{Tab}");
    expect(screen.getByRole<HTMLSelectElement>("combobox", { name: "Setting" }).value).toBe(
      "other",
    );
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "partial");
    await user.click(screen.getByRole("button", { name: "Record the interview" }));
    await screen.findByText("another page");
    const body = server.of("POST", "interviews")[0]?.body as { contacts: unknown[] };
    expect(body.contacts[0]).toMatchObject({ placeId, place: null, setting: "other" });
  });

  it("asks for facilities by name, and never puts a household into an address", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada{Tab}{Tab}h{Tab}12 Gull Row{Tab}");
    await user.keyboard("{Control>}{Enter}{/Control}Bo{Tab}{Tab}{Tab}14 Gull Row{Tab}");
    await user.keyboard("{Control>}{Enter}{/Control}Cy{Tab}{Tab}w{Tab}Ropewalk{Tab}");
    await waitFor(() => {
      expect(server.of("GET", "places").map(({ query }) => query)).toContain(
        "?q=Ropewalk&pageSize=200",
      );
    });
    expect(server.sent.some(({ query }) => query.includes("Gull"))).toBe(false);
  });
});
