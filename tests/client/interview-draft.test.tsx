// @vitest-environment jsdom
import { cleanup, fireEvent, screen } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import { caseId, interviewServer, openInterview, pass } from "./support/interview-desk.tsx";

const draftPath = `people/${caseId}/interview-draft`;
type Stored = { form: { contacts: { name: string }[] }; submitKey: string };

// Many keys on a busy machine.
vi.setConfig({ testTimeout: 30_000 });

beforeEach(() => {
  vi.useFakeTimers({ shouldAdvanceTime: true });
});
afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

function type(text: string) {
  fireEvent.change(screen.getAllByRole("textbox", { name: "Name" })[0] as HTMLElement, {
    target: { value: text },
  });
}
const line = () => document.querySelector("[data-draft-state]")?.textContent;

describe("draft of an interview", () => {
  it("is saved 800 ms after the last change, and says when", async () => {
    const server = interviewServer();
    await openInterview();
    expect(line()).toBe("Nothing to save yet");
    type("Ad");
    await pass(500);
    type("Ada");
    await pass(700);
    expect(line()).toBe("Not saved yet");
    expect(server.of("PUT", draftPath)).toHaveLength(0);
    await pass(150);
    expect(server.of("PUT", draftPath)).toHaveLength(1);
    expect(server.of("PUT", draftPath)[0]?.body.version).toBe(0);
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada");
    // 13:32 in UTC is 14:32 in the investigation's zone.
    expect(line()).toBe("Draft saved 14:32");
  });

  it("is saved at once when a box is left or a row opened", async () => {
    const server = interviewServer();
    await openInterview();
    type("Ada");
    fireEvent.blur(screen.getByRole("textbox", { name: "Name" }));
    await pass(10);
    expect(server.of("PUT", draftPath)).toHaveLength(1);
    type("Adam");
    fireEvent.click(screen.getByRole("button", { name: "Add a contact" }));
    await pass(10);
    expect(server.of("PUT", draftPath).map(({ body }) => body.version)).toEqual([0, 1]);
  });

  it("is kept in memory while offline and goes on by itself", async () => {
    const server = interviewServer();
    await openInterview();
    server.offline = true;
    type("Ada");
    await pass(900);
    expect(line()).toBe("Not saved: offline, kept here and tried again");
    type("Ada Brook");
    await pass(5_000);
    expect(server.of("PUT", draftPath)).toHaveLength(0);
    server.offline = false;
    await pass(31_000);
    expect(server.of("PUT", draftPath)).toHaveLength(1);
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada Brook");
    expect(line()).toBe("Draft saved 14:32");
    expect(localStorage).toHaveLength(0);
    expect(sessionStorage).toHaveLength(0);
  });

  it("goes on at once when the device says the connection is back", async () => {
    const server = interviewServer();
    await openInterview();
    server.offline = true;
    type("Ada");
    await pass(16_000);
    server.offline = false;
    fireEvent(window, new Event("online"));
    await pass(10);
    expect(server.of("PUT", draftPath)).toHaveLength(1);
  });

  it("asks before a page with unsaved words is left", async () => {
    const server = interviewServer();
    const { router } = await openInterview();
    server.offline = true;
    type("Ada");
    await pass(900);
    const leaving = new Event("beforeunload", { cancelable: true });
    window.dispatchEvent(leaving);
    expect(leaving.defaultPrevented).toBe(true);
    fireEvent.click(screen.getByRole("link", { name: "Leave, keep the draft" }));
    expect(await screen.findByRole("alertdialog", { name: "Leave without saving?" })).toBeTruthy();
    expect(router.state.location.pathname).toMatch(/interview$/);
  });

  it("comes back when the page opens again, under the same key", async () => {
    const server = interviewServer();
    await openInterview();
    type("Ada");
    await pass(900);
    const { submitKey } = server.draft.body as Stored;
    cleanup();
    await openInterview();
    expect(screen.getByText("Taken up again.")).toBeTruthy();
    expect(screen.getByRole<HTMLInputElement>("textbox", { name: "Name" }).value).toBe("Ada");
    fireEvent.change(screen.getByRole("combobox", { name: /Outcome/ }), {
      target: { value: "partial" },
    });
    fireEvent.click(screen.getByRole("button", { name: "Record the interview" }));
    await screen.findByText("another page");
    expect(server.of("POST", "interviews")[0]?.key).toBe(submitKey);
  });

  it("lets the tracer choose when another window saved first", async () => {
    const server = interviewServer();
    await openInterview();
    type("Ada");
    await pass(900);
    const other = structuredClone(server.draft.body) as Stored;
    (other.form.contacts[0] as { name: string }).name = "Bo";
    server.draft = { version: 7, body: other, updatedAt: "2026-05-27T14:05:00Z" };
    type("Ada Brook");
    await pass(900);
    const choice = await screen.findByText("This interview is open in another window of yours.");
    expect(choice.parentElement?.textContent).toMatch(/saved .*15:05 and has 1 contact/);
    const puts = server.of("PUT", draftPath).length;
    await pass(60_000);
    expect(server.of("PUT", draftPath)).toHaveLength(puts);

    fireEvent.click(screen.getByRole("button", { name: "Keep what is typed here" }));
    await pass(10);
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada Brook");
    expect(server.draft.version).toBe(8);

    server.draft = { version: 12, body: other, updatedAt: "2026-05-27T14:05:00Z" };
    type("Ada Brooke");
    await pass(900);
    fireEvent.click(await screen.findByRole("button", { name: "Take the other version" }));
    expect(screen.getByRole<HTMLInputElement>("textbox", { name: "Name" }).value).toBe("Bo");
  });

  it("knows its own version again when only the answer was lost", async () => {
    const server = interviewServer();
    await openInterview();
    const answered = globalThis.fetch;
    const lossy: typeof fetch = async (address, init) => {
      const answer = await answered(address, init);
      if (init?.method === "PUT") throw new TypeError("the answer was lost");
      return answer;
    };
    vi.stubGlobal("fetch", lossy);
    type("Ada");
    await pass(900);
    expect(server.draft.version).toBe(1);
    vi.stubGlobal("fetch", answered);
    type("Ada Brook");
    await pass(5_000);
    expect(screen.queryByText("This interview is open in another window of yours.")).toBeNull();
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada Brook");
  });

  it("is sent on its way out when the page is left while it waits", async () => {
    const server = interviewServer();
    await openInterview();
    type("Ada");
    await pass(100);
    fireEvent.click(screen.getByRole("link", { name: "Leave, keep the draft" }));
    await screen.findByText("another page");
    await pass(50);
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada");
  });

  it("can be emptied, and put back", async () => {
    const server = interviewServer();
    await openInterview();
    type("Ada");
    await pass(900);
    cleanup();
    await openInterview();
    const name = () => screen.getByRole<HTMLInputElement>("textbox", { name: "Name" }).value;
    const { submitKey } = server.draft.body as Stored;
    fireEvent.click(screen.getByRole("button", { name: "Begin anew" }));
    await pass(900);
    expect(name()).toBe("");
    expect((server.draft.body as Stored).submitKey).not.toBe(submitKey);
    fireEvent.click(screen.getByRole("button", { name: "Put it back" }));
    await pass(900);
    expect(name()).toBe("Ada");
    expect((server.draft.body as Stored).form.contacts[0]?.name).toBe("Ada");
  });
});
