// @vitest-environment jsdom
import { act, cleanup, fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { afterEach, describe, expect, it, vi } from "vitest";
import { TextField } from "../../src/components/fields/text-field.tsx";
import { Button } from "../../src/components/ui/button.tsx";
import { ConfirmDialog } from "../../src/components/ui/confirm-dialog.tsx";
import { Dialog } from "../../src/components/ui/dialog.tsx";
import { ErrorState } from "../../src/components/ui/error-state.tsx";
import { Notice } from "../../src/components/ui/notice.tsx";
import { Progress } from "../../src/components/ui/progress.tsx";
import { Tabs } from "../../src/components/ui/tabs.tsx";
import { ToastProvider } from "../../src/components/ui/toast-provider.tsx";
import { type ToastMessage, useToast } from "../../src/components/ui/use-toast.ts";

afterEach(() => {
  cleanup();
  vi.useRealTimers();
});

describe("button", () => {
  it("does not submit by accident and ignores clicks while pending, keeping focus", async () => {
    const user = userEvent.setup();
    const press = vi.fn();
    const { rerender } = render(<Button onClick={press}>Save</Button>);
    const button = screen.getByRole("button", { name: "Save" });
    expect(button.getAttribute("type")).toBe("button");
    await user.click(button);
    rerender(
      <Button onClick={press} pending pendingLabel="Saving">
        Save
      </Button>,
    );
    await user.click(button);
    expect(press).toHaveBeenCalledOnce();
    expect(document.activeElement).toBe(button);
    expect(button.getAttribute("aria-busy")).toBe("true");
  });

  it("a pending submit button does not send the form again", () => {
    const send = vi.fn((event: React.FormEvent) => event.preventDefault());
    render(
      <form onSubmit={send}>
        <Button type="submit" pending>
          Save
        </Button>
      </form>,
    );
    fireEvent.click(screen.getByRole("button"));
    expect(send).not.toHaveBeenCalled();
  });
});

function Opener() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Add a place</Button>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="New place"
        description="Seen by everyone here."
      >
        <TextField label="Name" />
      </Dialog>
    </>
  );
}

describe("dialog", () => {
  it("is named and described, takes focus to its first field, gives it back on Esc", async () => {
    const user = userEvent.setup();
    render(<Opener />);
    const opener = screen.getByRole("button", { name: "Add a place" });
    await user.click(opener);
    const dialog = screen.getByRole("dialog", { name: "New place" });
    const described = document.getElementById(dialog.getAttribute("aria-describedby") ?? "");
    expect(described?.textContent).toBe("Seen by everyone here.");
    expect(document.activeElement).toBe(within(dialog).getByRole("textbox", { name: "Name" }));
    await user.keyboard("{Escape}");
    expect(screen.queryByRole("dialog")).toBeNull();
    expect(document.activeElement).toBe(opener);
  });

  it("puts no style element into the page, which the policy would refuse", async () => {
    const user = userEvent.setup();
    const before = document.querySelectorAll("style").length;
    render(<Opener />);
    await user.click(screen.getByRole("button", { name: "Add a place" }));
    expect(document.querySelectorAll("style")).toHaveLength(before);
  });

  it("asks before harm, with focus on the harmless answer", async () => {
    const user = userEvent.setup();
    const confirm = vi.fn();
    const change = vi.fn();
    render(
      <ConfirmDialog
        open
        onOpenChange={change}
        title="Withdraw this pair?"
        description="Past reports keep it."
        confirmLabel="Withdraw pair"
        onConfirm={confirm}
        danger
      />,
    );
    const dialog = screen.getByRole("alertdialog", { name: "Withdraw this pair?" });
    const keep = within(dialog).getByRole("button", { name: "Keep as it is" });
    expect(document.activeElement).toBe(keep);
    await user.click(keep);
    expect(change).toHaveBeenCalledWith(false);
    await user.click(within(dialog).getByRole("button", { name: "Withdraw pair" }));
    expect(confirm).toHaveBeenCalledOnce();
  });
});

describe("messages", () => {
  it("reads errors out at once and the rest politely", () => {
    render(
      <>
        <Notice tone="error">Two errors.</Notice>
        <Notice tone="warn">Look.</Notice>
      </>,
    );
    expect(screen.getByRole("alert").textContent).toBe("ErrorTwo errors.");
    expect(screen.getByRole("status").textContent).toBe("Take careLook.");
  });

  it.each(["offline", "no-permission", "conflict", "not-found", "error"] as const)(
    "%s has words of its own",
    (kind) => {
      const { container } = render(<ErrorState kind={kind} />);
      const role = kind === "error" || kind === "conflict" ? "alert" : "status";
      expect(screen.getByRole(role)).toBeTruthy();
      expect(container.textContent?.length).toBeGreaterThan(40);
    },
  );

  it("shows progress with its figures, and lets it be stopped", async () => {
    const user = userEvent.setup();
    const stop = vi.fn();
    render(
      <Progress label="Checking rows" value={42} max={84} detail="42 of 84" onCancel={stop} />,
    );
    const bar = screen.getByRole("progressbar", { name: "Checking rows" });
    expect(bar.getAttribute("aria-valuenow")).toBe("42");
    await user.click(screen.getByRole("button", { name: "Stop" }));
    expect(stop).toHaveBeenCalledOnce();
  });
});

function Shower({ message }: { message: ToastMessage }) {
  const show = useToast();
  return <Button onClick={() => show(message)}>show</Button>;
}

describe("toasts", () => {
  it("leave after a while, errors do not", () => {
    vi.useFakeTimers();
    const { rerender } = render(
      <ToastProvider>
        <Shower message={{ text: "Saved.", tone: "done" }} />
      </ToastProvider>,
    );
    fireEvent.click(screen.getByRole("button", { name: "show" }));
    expect(screen.getByText("Saved.").closest("[aria-live]")?.getAttribute("aria-live")).toBe(
      "polite",
    );
    rerender(
      <ToastProvider>
        <Shower message={{ text: "Not saved.", tone: "error" }} />
      </ToastProvider>,
    );
    fireEvent.click(screen.getByRole("button", { name: "show" }));
    act(() => void vi.advanceTimersByTime(6_100));
    expect(screen.queryByText("Saved.")).toBeNull();
    const error = screen.getByText("Not saved.");
    expect(error.closest("[aria-live]")?.getAttribute("aria-live")).toBe("assertive");
    fireEvent.click(screen.getByRole("button", { name: "Close" }));
    expect(screen.queryByText("Not saved.")).toBeNull();
  });

  it("run their action once and go", async () => {
    const user = userEvent.setup();
    const run = vi.fn();
    render(
      <ToastProvider>
        <Shower message={{ text: "Moved.", action: { label: "Undo", run } }} />
      </ToastProvider>,
    );
    await user.click(screen.getByRole("button", { name: "show" }));
    await user.click(screen.getByRole("button", { name: "Undo" }));
    expect(run).toHaveBeenCalledOnce();
    expect(screen.queryByText("Moved.")).toBeNull();
  });
});

describe("tabs", () => {
  it("move by arrow keys", async () => {
    const user = userEvent.setup();
    render(
      <Tabs
        label="Safeguard"
        items={[
          { id: "policy", label: "Field policy", content: "the policy" },
          { id: "events", label: "Access events", count: 3, content: "the events" },
        ]}
      />,
    );
    await user.click(screen.getByRole("tab", { name: "Field policy" }));
    await user.keyboard("{ArrowRight}");
    expect(screen.getByRole("tabpanel", { name: /Access events/ }).textContent).toBe("the events");
  });
});
