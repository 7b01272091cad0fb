// @vitest-environment jsdom
import { cleanup, screen, waitFor } from "@testing-library/react";
import { afterEach, describe, expect, it, vi } from "vitest";
import {
  caseId,
  interviewServer,
  knownId,
  match,
  openInterview,
  problem,
  renderInterview,
} from "./support/interview-desk.tsx";

// Many keys on a busy machine.
vi.setConfig({ testTimeout: 30_000 });

afterEach(cleanup);

const focused = () => document.activeElement as HTMLInputElement;
const record = () => screen.getByRole("button", { name: "Record the interview" });

describe("people already on record", () => {
  it("are offered below the row, chosen by keys, and tied to it", async () => {
    const server = interviewServer();
    server.matches = [match, { ...match, personId: caseId, studyNumber: "D-0412" }];
    const { user } = await openInterview();
    await user.keyboard("Linnet Marsh{Tab}07700 900071");
    const offer = await screen.findByRole("button", { name: /D-0099/ });
    expect(offer.textContent).toMatch(/Linnet Marsh.*aged 45-64 · Harbour · phone ends 71/);
    expect(offer.textContent).toMatch(/same phone, name/);
    // The case is never offered as a contact of their own.
    expect(screen.queryByRole("button", { name: /^D-0412/ })).toBeNull();
    await user.keyboard("{ArrowDown}");
    expect(focused()).toBe(offer);
    await user.keyboard("{Enter}");
    await waitFor(() => expect(focused().dataset.box).toBe("setting"));
    expect(screen.queryByRole("textbox", { name: "Name" })).toBeNull();

    await user.click(screen.getByRole("button", { name: "Untie row 1 from D-0099" }));
    const name = screen.getByRole<HTMLInputElement>("textbox", { name: "Name" });
    expect(name.value).toBe("Linnet Marsh");
    name.focus();
    await screen.findByRole("button", { name: /D-0099/ });
    await user.keyboard("{ArrowDown}{Enter}h");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    await user.click(record());
    await screen.findByText("another page");
    const body = server.of("POST", "interviews")[0]?.body as { contacts: unknown[] };
    expect(body.contacts).toHaveLength(1);
    expect(body.contacts[0]).toMatchObject({
      personId: knownId,
      name: null,
      phone: null,
      setting: "household",
    });
  });

  it("are asked for in a body, only once there is enough to go by", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Li{Tab}0770");
    await new Promise((resolve) => setTimeout(resolve, 400));
    expect(server.of("POST", "people/matches")).toHaveLength(0);
    await user.keyboard("0 9");
    await waitFor(() => expect(server.of("POST", "people/matches")).toHaveLength(1));
    expect(server.of("POST", "people/matches")[0]?.body).toEqual({ phone: "07700 9" });
  });

  it("may be named in a second row, which is a further exposure of the same pair", async () => {
    const server = interviewServer();
    server.matches = [match];
    const { user } = await openInterview();
    await user.keyboard("Linnet Marsh");
    await screen.findByRole("button", { name: /D-0099/ });
    await user.keyboard("{ArrowDown}{Enter}w{Control>}{Enter}{/Control}Linnet Marsh");
    const offer = await screen.findByRole("button", { name: /also row 1: a further exposure/ });
    await user.keyboard("{ArrowDown}");
    expect(focused()).toBe(offer);
    await user.keyboard("{Enter}s");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    await user.click(record());
    await screen.findByText("another page");
    const body = server.of("POST", "interviews")[0]?.body as {
      contacts: { personId: string; setting: string }[];
    };
    expect(body.contacts.map(({ personId, setting }) => [personId, setting])).toEqual([
      [knownId, "workplace"],
      [knownId, "school"],
    ]);
  });

  it("give nothing away when there is no match", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Linnet Marsh");
    await waitFor(() => expect(server.of("POST", "people/matches")).toHaveLength(1));
    expect(screen.queryByText(/already on record/)).toBeNull();
  });
});

describe("recording", () => {
  it("checks with the contract first: errors beside boxes, blank rows left out", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard(
      "Cy{Control>}{Enter}{/Control}Ada{Control>}{Enter}{/Control}Bo{Tab}{Tab}{Tab}{Tab}2026-05-22{Tab}",
    );
    await user.keyboard("2026-05-21{Tab}lots{Tab}");
    // Row 1 is blank again, so the second row is the first one sent.
    await user.clear(screen.getAllByRole("textbox", { name: "Name" })[0] as HTMLElement);
    await user.click(record());
    expect(await screen.findByText("Not recorded: some boxes need another look.")).toBeTruthy();
    expect(server.of("POST", "interviews")).toHaveLength(0);
    const minutes = screen.getAllByRole("textbox", { name: "minutes together in all" });
    expect(minutes.map((box) => box.getAttribute("aria-invalid"))).toEqual([null, null, "true"]);
    expect(screen.getByText("Not a number")).toBeTruthy();
    expect(screen.getByText("Needed")).toBeTruthy();
  });

  it("puts the server's errors beside the rows they belong to and goes to the first", async () => {
    const server = interviewServer();
    server.interviewAnswers.push(() =>
      problem(422, "invalid", [
        { path: "contacts.0.phone", code: "not_a_phone" },
        { path: "contacts.1.firstExposure", code: "in_future" },
        { path: "groupExposures.0.countMax", code: "max_below_min" },
      ]),
    );
    const { user } = await openInterview();
    await user.keyboard("Cy{Control>}{Enter}{/Control}");
    await user.keyboard(
      "Ada{Tab}12{Control>}{Enter}{/Control}Bo{Tab}{Tab}{Tab}{Tab}2026-05-28{Tab}",
    );
    await user.clear(screen.getAllByRole("textbox", { name: "Name" })[0] as HTMLElement);
    await user.click(screen.getByRole("button", { name: "Add a group" }));
    await user.keyboard("s");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    await user.click(record());
    expect(await screen.findByText("Not a telephone number")).toBeTruthy();
    expect(screen.getByText("In the future")).toBeTruthy();
    expect(screen.getByText("The largest number is below the smallest")).toBeTruthy();
    const phones = screen.getAllByRole("textbox", { name: "Phone" });
    expect(phones.map((box) => box.getAttribute("aria-invalid"))).toEqual([null, "true", null]);
    await waitFor(() => expect(focused().value).toBe("12"));
  });

  it("sends again under the same key when no answer came, and makes one interview", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.keyboard("Ada");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    server.interviewAnswers.push(() => {
      throw new TypeError("lost");
    });
    await user.click(record());
    expect(await screen.findByText(/No connection; nothing was sent/)).toBeTruthy();
    await user.dblClick(record());
    await screen.findByText("another page");
    const keys = server.of("POST", "interviews").map(({ key }) => key);
    expect(keys).toHaveLength(2);
    expect(new Set(keys).size).toBe(1);
  });

  it("waits while the same request is still being worked on", async () => {
    const server = interviewServer();
    server.interviewAnswers.push(() => problem(409, "in_flight"));
    const { user } = await openInterview();
    await user.keyboard("Ada");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    await user.click(record());
    await screen.findByText("another page", {}, { timeout: 3_000 });
    expect(server.of("POST", "interviews")).toHaveLength(2);
  });

  it("says so when the form was recorded before with other content", async () => {
    const server = interviewServer();
    server.interviewAnswers.push(() => problem(422, "key_reused"));
    const { user } = await openInterview();
    await user.keyboard("Ada");
    await user.selectOptions(screen.getByRole("combobox", { name: /Outcome/ }), "complete");
    await user.click(record());
    expect(await screen.findByText(/recording again makes a second interview/)).toBeTruthy();
    await user.click(record());
    await screen.findByText("another page");
    const keys = server.of("POST", "interviews").map(({ key }) => key);
    expect(new Set(keys).size).toBe(2);
  });

  it("records a bare attempt and gives the draft that stays a new key", async () => {
    const server = interviewServer();
    const { user } = await openInterview();
    await user.click(screen.getByRole("button", { name: /Nobody reached/ }));
    await user.click(record());
    await screen.findByText("another page");
    const sent = server.of("POST", "interviews")[0];
    expect(sent?.body).toMatchObject({ outcome: "attempted", contacts: [], groupExposures: [] });
    expect(screen.getByText("Attempt recorded: nobody was reached this time.")).toBeTruthy();
    const kept = server.draft.body as { submitKey: string };
    expect(kept.submitKey).not.toBe(sent?.key);
  });
});

describe("a person who is not to be interviewed here", () => {
  it("shows no form", async () => {
    const server = interviewServer();
    server.person = { ...server.person, can: {} };
    renderInterview();
    expect(await screen.findByText("This interview is not yours to hold")).toBeTruthy();
    expect(server.sent.some(({ path }) => path.includes("draft"))).toBe(false);
  });
});
