// @vitest-environment jsdom
import { cleanup, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import type { Export } from "../../shared/contracts/exports.ts";
import type { Role } from "../../shared/roles.ts";
import { Component } from "../../src/app/routes/exports-route.tsx";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { holdsWords, narrowedWords } from "../../src/features/exports/export-words.ts";
import { filterFromAddress } from "../../src/features/exports/filter-from-address.ts";
import { CODED, type CodedFilter } from "../../src/features/people/use-list-state.ts";
import { formatDay } from "../../src/lib/formatters.ts";
import { ids } from "./support/network-answers.ts";
import { type Answers, renderRoom } from "./support/room.tsx";

afterEach(cleanup);

const me = ids.small;

const inAddress: Record<CodedFilter, string> = {
  classification: "contact",
  interviewed: "no",
  interviewState: "none",
  assigned: "team",
  followUp: "no",
  onsetFrom: "2026-05-01",
  onsetTo: "2026-05-02",
  reportFrom: "2026-05-03",
  reportTo: "2026-05-04",
};

function file(over: Partial<Export> = {}): Export {
  return {
    id: ids.large,
    kind: "people",
    identified: false,
    purpose: "analysis",
    reason: null,
    filter: {},
    columns: ["ref"],
    role: "supervisor",
    accountId: me,
    displayName: "Ada Field",
    state: "ready",
    progress: 1,
    failure: null,
    rows: 1036,
    bytes: 120_000,
    sha256: "ab12cd34".repeat(8),
    fileName: "strandline-people-0000aaaa.csv",
    downloads: 2,
    recordedAt: "2026-05-27T08:30:00.000Z",
    finishedAt: "2026-05-27T08:30:02.000Z",
    expiresAt: "2026-05-28T08:30:02.000Z",
    can: { download: true, remove: true },
    ...over,
  };
}

type Sent = { path: string; method: string; body: unknown };

function open(
  options: {
    files?: Export[];
    role?: Role;
    at?: string;
    post?: (sent: Sent) => Response | undefined;
  } = {},
) {
  const { files = [], role = "supervisor", at = "/room", post } = options;
  const sent: Sent[] = [];
  const answers: Answers = (path) => {
    if (path.startsWith("exports/")) return files[0] ?? file();
    return { items: files, total: files.length, page: 1, pageSize: 25 };
  };
  const room = () => (
    <ToastProvider>
      <Component />
    </ToastProvider>
  );
  const session = { actingRole: role, accountId: me };
  const opened = renderRoom({ room, at, rooms: ["trace"], answers, session });
  const plain = globalThis.fetch;
  globalThis.fetch = async (address, init = {}) => {
    const url = new URL(String(address), "http://localhost");
    if (init.method === "POST") {
      const one = {
        path: url.pathname.replace(`/api/investigations/${ids.investigation}/`, ""),
        method: "POST",
        body: JSON.parse(String(init.body)),
      };
      sent.push(one);
      return (
        post?.(one) ??
        new Response(JSON.stringify({ id: ids.large }), {
          status: 201,
          headers: { "content-type": "application/json" },
        })
      );
    }
    return plain(address, init);
  };
  return { ...opened, sent };
}

const problem = (status: number, code: string, errors: unknown[] = []) =>
  new Response(JSON.stringify({ code, status, errors }), {
    status,
    headers: { "content-type": "application/problem+json" },
  });

describe("asking for a file", () => {
  it("is by study number unless said otherwise, and wants to know what for", async () => {
    const user = userEvent.setup();
    const { sent } = open();
    await screen.findByText("Nothing was taken out yet");
    expect(screen.getByRole("note").textContent).toContain(
      "Removing names does not make a contact network anonymous.",
    );
    expect(screen.getByText(/Groups that could not be named/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Make the file" }));
    await screen.findByText("Needed");
    expect(sent).toEqual([]);
    await user.selectOptions(screen.getByLabelText(/What for/), "something else");
    await user.click(screen.getByRole("button", { name: "Make the file" }));
    await screen.findByText("Needed");
    await user.type(screen.getByLabelText("In a few words"), "Harbour office");
    await user.click(screen.getByRole("button", { name: "Make the file" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]).toMatchObject({
      path: "exports",
      body: { kind: "people", identified: false, purpose: "other", reason: "Harbour office" },
    });
  });

  it("takes the line list's filters along, and lets go of them", async () => {
    const user = userEvent.setup();
    const { sent } = open({ at: "/room?classification=case&interviewed=no&assigned=curious" });
    await screen.findByText(/Only cases, not interviewed, as the line list was/);
    await user.selectOptions(screen.getByLabelText(/What for/), "analysis elsewhere");
    await user.click(screen.getByRole("button", { name: "Make the file" }));
    await waitFor(() => expect(sent).toHaveLength(1));
    expect(sent[0]?.body).toMatchObject({
      filter: { classification: "case", interviewed: "no" },
    });
    await user.click(screen.getByRole("button", { name: "Take everybody" }));
    expect(screen.queryByText(/Only cases/)).toBeNull();
    // Pairs are never narrowed down.
    cleanup();
    open({ at: "/room?classification=case" });
    await user.click(await screen.findByLabelText("Contact pairs"));
    expect(screen.queryByText(/Only cases/)).toBeNull();
  });

  it("asks for the password again when the server does, then goes on", async () => {
    const user = userEvent.setup();
    let confirmed = false;
    const { sent } = open({
      post: ({ path, body }) => {
        if (path !== "/api/session/confirm") {
          return confirmed ? undefined : problem(403, "confirm_needed");
        }
        if ((body as { password: string }).password !== "right one") {
          return problem(422, "invalid", [{ path: "password", code: "wrong_password" }]);
        }
        confirmed = true;
        return new Response(JSON.stringify({ confirmedUntil: "2026-05-27T08:35:00.000Z" }), {
          headers: { "content-type": "application/json" },
        });
      },
    });
    await user.click(await screen.findByLabelText("With identity"));
    await user.selectOptions(screen.getByLabelText(/What for/), "hand-over to another team");
    await user.click(screen.getByRole("button", { name: "Make the file" }));
    const dialog = await screen.findByRole("dialog", { name: "Your password, once more" });
    await user.type(within(dialog).getByLabelText("Password"), "wrong one{Enter}");
    await within(dialog).findByText("Not your password");
    await user.clear(within(dialog).getByLabelText("Password"));
    await user.type(within(dialog).getByLabelText("Password"), "right one");
    await user.click(within(dialog).getByRole("button", { name: "Go on" }));
    await waitFor(() => expect(sent.filter(({ path }) => path === "exports")).toHaveLength(2));
    expect(sent.at(-1)?.body).toMatchObject({ identified: true, purpose: "handover" });
  });

  it("says what a role gets, and offers identity only where there is any", async () => {
    open({ role: "epidemiologist" });
    await screen.findByText("Nothing was taken out yet");
    expect(screen.queryByLabelText("With identity")).toBeNull();
    expect(holdsWords("people", "supervisor", true)).toBe(
      "Holds references, names, telephone numbers, e-mail addresses, birth dates and addresses; households by name.",
    );
    expect(holdsWords("people", "officer", true)).toBe(
      "Holds references; households by number. Columns your role may not read are there and blank.",
    );
    expect(holdsWords("pairs", "epidemiologist", false)).toBe(
      "People stand by study number; households by number.",
    );
    expect(filterFromAddress(new URLSearchParams("assigned=me&needs=x&q=Jo&area=Jo"))).toEqual({
      assigned: "me",
    });
    // Whatever narrows the list narrows the file: nothing more leaves than was on the screen.
    const address = new URLSearchParams(CODED.map((name) => [name, inAddress[name]]));
    expect(filterFromAddress(address)).toEqual(inAddress);
    const [onset, onsetEnd, report, reportEnd] = CODED.slice(-4).map((name) =>
      formatDay(inAddress[name]),
    );
    expect(narrowedWords(filterFromAddress(address))).toBe(
      `contacts, not interviewed, interview not begun, assigned to your team, without any check of follow-up, onset from ${onset} to ${onsetEnd}, reported from ${report} to ${reportEnd}`,
    );
  });

  it("is not open to a tracer", () => {
    open({ role: "tracer" });
    expect(screen.getByText("Not open to the role you act in")).toBeTruthy();
  });
});

describe("files taken out", () => {
  it("shows one being made with its progress, and cancels it at a word", async () => {
    const user = userEvent.setup();
    const making = file({
      state: "building",
      progress: 0.42,
      sha256: null,
      can: { download: false, remove: true },
    });
    const { asked } = open({ files: [making] });
    const bar = await screen.findByRole("progressbar", { name: /Line list, by study number/ });
    expect(bar.getAttribute("aria-valuetext")).toMatch(/42\s?%/);
    await user.click(screen.getByRole("button", { name: "Cancel" }));
    await waitFor(() => expect(asked).toContain(`DELETE exports/${making.id}`));
  });

  it("offers a ready one to its maker, and asks before it is deleted", async () => {
    const user = userEvent.setup();
    const { asked } = open({ files: [file()] });
    const link = await screen.findByRole("link", { name: /^Download/ });
    expect(link.getAttribute("href")).toBe(
      `/api/investigations/${ids.investigation}/exports/${ids.large}/file`,
    );
    expect(screen.getByText(/1,036 rows, 120 KB\. To be fetched until .*2026/)).toBeTruthy();
    await user.click(screen.getByRole("button", { name: /^Delete/ }));
    const dialog = await screen.findByRole("alertdialog", { name: "Delete this file?" });
    expect(asked.some((one) => one.startsWith("DELETE"))).toBe(false);
    await user.click(within(dialog).getByRole("button", { name: "Delete the file" }));
    await waitFor(() => expect(asked).toContain(`DELETE exports/${ids.large}`));
  });

  it("keeps a record: who, as what, which, what for, state, rows, fetched, checksum", async () => {
    const other = file({
      accountId: ids.investigation,
      displayName: "Bo Reed",
      identified: true,
      purpose: "other",
      reason: "Harbour office",
      can: { download: false, remove: true },
    });
    open({ files: [other], role: "officer" });
    const table = await screen.findByRole("table", { name: "Files taken out, newest first" });
    const row = within(table).getByRole("row", { name: /Bo Reed/ });
    expect(row.textContent).toMatch(
      /Supervisor.*line list, with identity.*something else: Harbour office.*ready.*1,036.*2 ×.*ab12cd34/,
    );
    expect(screen.queryByRole("link", { name: /^Download/ })).toBeNull();
    expect(within(row).getByRole("button", { name: /^Delete/ })).toBeTruthy();
  });

  it("says why one was not made", async () => {
    open({
      files: [
        file({
          state: "failed",
          failure: "export_no_access",
          sha256: null,
          can: { download: false, remove: false },
        }),
      ],
    });
    const alert = await screen.findByRole("alert");
    expect(alert.textContent).toContain("You signed out or changed role before it was finished");
  });
});
