// @vitest-environment jsdom
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { MemoryRouter, Route, Routes, useLocation } from "react-router-dom";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { TextField } from "../../src/components/fields/text-field.tsx";
import { AppFrame, type Room } from "../../src/components/layouts/app-frame.tsx";
import { RoomPage } from "../../src/components/layouts/room-page.tsx";
import { ThemeSwitch } from "../../src/components/layouts/theme-switch.tsx";
import { currentTheme, readThemeChoice } from "../../src/lib/theme.ts";

afterEach(cleanup);
beforeEach(() => {
  localStorage.clear();
  document.documentElement.removeAttribute("data-theme");
});

const rooms: readonly Room[] = [
  { id: "trace", label: "Trace", to: "/trace", digit: 1 },
  { id: "review", label: "Review", to: "/review", digit: 3 },
];

function Here() {
  return <RoomPage title={`at ${useLocation().pathname}`}>{null}</RoomPage>;
}

function Frame({ roomKeys }: { roomKeys?: boolean }) {
  return (
    <MemoryRouter initialEntries={["/trace"]}>
      <AppFrame
        rooms={rooms}
        homeTo="/trace"
        roomKeys={roomKeys}
        banner="Invented data"
        cutOffLine="cut-off 27 May"
        footer="Not medical advice."
      >
        <TextField label="Search" />
        <Routes>
          <Route path="*" element={<Here />} />
        </Routes>
      </AppFrame>
    </MemoryRouter>
  );
}

const title = () => screen.getByRole("heading", { level: 1 }).textContent;

describe("app frame", () => {
  it("has landmarks, a way past the header, and marks the room one is in", async () => {
    const user = userEvent.setup();
    render(<Frame />);
    const nav = screen.getByRole("navigation", { name: "Rooms" });
    const links = within(nav).getAllByRole("link");
    expect(links.map((link) => link.textContent)).toEqual(["Trace", "Review"]);
    expect(links.map((link) => link.getAttribute("aria-current"))).toEqual(["page", null]);
    expect(within(screen.getByRole("banner")).getByText("Invented data")).toBeTruthy();
    expect(screen.getByRole("contentinfo").textContent).toBe("Not medical advice.");

    document.body.focus();
    (document.activeElement as HTMLElement | null)?.blur();
    await user.tab();
    const skip = document.activeElement;
    expect(skip?.textContent).toBe("Skip to the page");
    expect(document.querySelector(skip?.getAttribute("href") ?? "")).toBe(screen.getByRole("main"));
  });

  it("opens rooms by Alt and a digit, and only those it was given", async () => {
    const user = userEvent.setup();
    render(<Frame />);
    await user.keyboard("{Alt>}3{/Alt}");
    expect(title()).toBe("at /review");
    await user.keyboard("{Alt>}5{/Alt}");
    expect(title()).toBe("at /review");
    await user.keyboard("1");
    expect(title()).toBe("at /review");
  });

  it("never does so in a field, nor when switched off", async () => {
    const user = userEvent.setup();
    const { rerender } = render(<Frame />);
    await user.click(screen.getByRole("textbox", { name: "Search" }));
    await user.keyboard("{Alt>}3{/Alt}");
    expect(title()).toBe("at /trace");
    rerender(<Frame roomKeys={false} />);
    (document.activeElement as HTMLElement).blur();
    await user.keyboard("{Alt>}3{/Alt}");
    expect(title()).toBe("at /trace");
    const link = screen.getByRole("link", { name: "Review" });
    expect(link.hasAttribute("aria-keyshortcuts")).toBe(false);
  });
});

describe("room page", () => {
  it("names the document and takes focus to its title", () => {
    render(<RoomPage title="Line list">text</RoomPage>);
    expect(document.title).toBe("Line list · Strandline");
    expect(document.activeElement).toBe(screen.getByRole("heading", { name: "Line list" }));
  });
});

describe("theme", () => {
  it("follows the device until chosen, then remembers", async () => {
    const user = userEvent.setup();
    render(<ThemeSwitch />);
    const choice = screen.getByRole("combobox", { name: "Theme" });
    expect(readThemeChoice()).toBe("system");
    await user.selectOptions(choice, "dark");
    expect(document.documentElement.getAttribute("data-theme")).toBe("dark");
    expect(currentTheme()).toBe("dark");
    expect(readThemeChoice()).toBe("dark");
    await user.selectOptions(choice, "system");
    expect(document.documentElement.hasAttribute("data-theme")).toBe(false);
    expect(localStorage.length).toBe(0);
  });
});
