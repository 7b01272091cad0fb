// @vitest-environment jsdom
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, describe, expect, it } from "vitest";
import { Bars } from "../../src/components/bars/bars.tsx";
import { createDayScale } from "../../src/components/day-strip/day-scale.ts";
import { DayStrip } from "../../src/components/day-strip/day-strip.tsx";
import type { DayStripRow } from "../../src/components/day-strip/day-strip-row.ts";
import { createThresholdScale } from "../../src/components/threshold-strip/threshold-scale.ts";
import { ThresholdStrip } from "../../src/components/threshold-strip/threshold-strip.tsx";

afterEach(cleanup);

describe("day scale", () => {
  const scale = createDayScale("2026-05-04", "2026-05-31", 100, 380);

  it("gives every day the same width and marks Mondays", () => {
    expect(scale.dayWidth).toBe(10);
    expect(scale.start("2026-05-04")).toBe(100);
    expect(scale.end("2026-05-31")).toBe(380);
    expect(scale.middle("2026-05-18")).toBe(245);
    expect(scale.ticks.map(({ day }) => day)).toEqual([
      "2026-05-04",
      "2026-05-11",
      "2026-05-18",
      "2026-05-25",
    ]);
  });

  it("holds windows inside the plot and leaves out days beyond it", () => {
    expect(scale.start("2026-04-01")).toBe(100);
    expect(scale.end("2026-07-01")).toBe(380);
    expect(scale.middle("2026-07-01")).toBeNull();
    expect(scale.start("2026-05")).toBeNull();
  });

  it("thins labels that would touch", () => {
    const long = createDayScale("2026-01-01", "2026-12-31", 0, 365);
    const gaps = long.ticks.slice(1).map(({ x }, index) => x - (long.ticks[index]?.x ?? 0));
    expect(Math.min(...gaps)).toBeGreaterThanOrEqual(58);
    expect(long.dayEdges).toEqual([]);
  });
});

const rows: readonly DayStripRow[] = [
  {
    type: "window",
    id: "i",
    label: "infectious window",
    window: "infectious",
    from: "2026-05-17",
    to: "2026-05-24",
    reference: { day: "2026-05-19", label: "onset" },
  },
  {
    type: "window",
    id: "s",
    label: "source window",
    window: "source",
    from: null,
    to: null,
    unknown: "no onset on record",
  },
  {
    type: "due",
    id: "d",
    label: "D-4417",
    days: [
      { day: "2026-05-18", state: "seen" },
      { day: "2026-05-19", state: "missed" },
      { day: "2026-05-20", state: "due" },
      { day: "2026-05-21", state: "to_come" },
    ],
  },
];

describe("day strip", () => {
  it("is a picture with a text, and a table after t", async () => {
    const user = userEvent.setup();
    render(<DayStrip label="Days of D-4417" from="2026-05-04" to="2026-05-31" rows={rows} />);
    const picture = screen.getByRole("img", { name: /^Days of D-4417\./ });
    expect(picture.textContent).toContain("no onset on record");

    screen.getByRole("figure", { name: "Days of D-4417" }).focus();
    await user.keyboard("t");
    const table = screen.getByRole("table", { name: "Days of D-4417" });
    expect(screen.queryByRole("img")).toBeNull();
    const words = within(table)
      .getAllByRole("row")
      .map((row) => row.textContent);
    expect(words.some((line) => line?.includes("missed"))).toBe(true);
    expect(words.some((line) => line?.includes("source window: no onset on record"))).toBe(true);

    await user.keyboard("t");
    expect(screen.getByRole("img", { name: /^Days of D-4417\./ })).toBeTruthy();
  });

  it("has the same behind a button that names its figure", async () => {
    const user = userEvent.setup();
    render(<DayStrip label="Days" from="2026-05-04" to="2026-05-31" rows={rows} legend />);
    await user.click(screen.getByRole("button", { name: "Days, as a table" }));
    expect(screen.getByRole("table")).toBeTruthy();
    expect(screen.getByRole("button", { name: "Days, as a picture" })).toBeTruthy();
    expect(screen.getByRole("list", { name: "What is drawn" }).textContent).toContain("to come");
  });

  it("draws one block a case, and plain bars when days get many", () => {
    const onsets = (count: number): DayStripRow => ({
      type: "onsets",
      id: "o",
      label: "cases",
      counts: [{ day: "2026-05-10", count }],
    });
    const { container, rerender } = render(
      <DayStrip label="Onsets" from="2026-05-04" to="2026-05-31" rows={[onsets(3)]} />,
    );
    expect(container.querySelectorAll("svg rect")).toHaveLength(3);
    rerender(<DayStrip label="Onsets" from="2026-05-04" to="2026-05-31" rows={[onsets(30)]} />);
    expect(container.querySelectorAll("svg rect")).toHaveLength(1);
    expect(container.textContent).toContain("30 a day");
  });
});

describe("threshold scale", () => {
  it("is logarithmic, 0.25 to 16, with 1 a third of the way", () => {
    const scale = createThresholdScale([1.5], 0, 600);
    expect([scale.low, scale.high]).toEqual([0.25, 16]);
    expect(scale.x(1)).toBeCloseTo(200, 10);
    expect(scale.x(4)).toBeCloseTo(400, 10);
    expect(scale.ticks.map(({ value }) => value)).toEqual([0.25, 0.5, 1, 2, 4, 8, 16]);
  });

  it("extends for the data and holds 0 at its end", () => {
    const scale = createThresholdScale([0, 0.2, 21], 0, 600);
    expect([scale.low, scale.high]).toEqual([0.125, 32]);
    expect(scale.x(0)).toBe(0);
  });
});

describe("threshold strip", () => {
  it("says value, interval, threshold and window in words and in its table", async () => {
    const user = userEvent.setup();
    render(
      <ThresholdStrip
        value={1.52}
        interval={[1.28, 1.78]}
        n={1000}
        trail={[{ day: "2026-05-26", value: 1.4 }]}
        sentence="Above the threshold."
      />,
    );
    const picture = screen.getByRole("img");
    // w = n^(-1/3) = 0.1 for n = 1000.
    expect(picture.getAttribute("aria-label")).toBe(
      "Threshold strip: 1.52 (1.28–1.78) pairs per person; threshold at 1, critical window 0.90–1.10, n 1,000.",
    );
    expect(picture.textContent).toContain("giant component: 1 pair, p = 1/n");
    expect(screen.getByText("Above the threshold.")).toBeTruthy();

    await user.click(screen.getByRole("button", { name: "Threshold strip, as a table" }));
    const table = screen.getByRole("table");
    expect(within(table).getByRole("row", { name: /observed 1.52 1.28–1.78/ })).toBeTruthy();
    // ln 1000 = 6.9078
    expect(within(table).getByRole("row", { name: /ln n 6.91/ })).toBeTruthy();
  });

  it("shows a reason instead of a value, and never a point", () => {
    const { container } = render(
      <ThresholdStrip value={null} interval={null} n={null} reason="too few" sentence="None." />,
    );
    expect(container.querySelector("svg circle")).toBeNull();
    expect(screen.getByRole("img").getAttribute("aria-label")).toContain("too few");
    expect(container.textContent).not.toContain("critical window");
  });

  it("draws the value hollow where no verdict may be given", () => {
    const { container } = render(
      <ThresholdStrip
        value={1.05}
        interval={[0.7, 1.4]}
        n={24}
        hasVerdict={false}
        sentence="Too few people for a verdict."
      />,
    );
    expect(container.querySelector("svg circle")?.getAttribute("fill")).toBe("var(--paper)");
  });
});

describe("bars", () => {
  it("count by category, with their table", async () => {
    const user = userEvent.setup();
    render(
      <Bars
        label="Group sizes"
        categoryLabel="people in a group"
        valueLabel="groups"
        items={[
          { label: "1", value: 12 },
          { label: "2", value: 4, reference: [2, 9] },
        ]}
      />,
    );
    expect(
      screen.getByRole("img", { name: /Group sizes: groups by people in a group/ }),
    ).toBeTruthy();
    await user.click(screen.getByRole("button", { name: "Group sizes, as a table" }));
    expect(screen.getByRole("row", { name: "2 4 2–9" })).toBeTruthy();
    expect(screen.getByRole("row", { name: "1 12 —" })).toBeTruthy();
  });

  it("say so when there is nothing to count", () => {
    render(<Bars label="Degrees" categoryLabel="pairs" valueLabel="people" items={[]} />);
    expect(screen.getByText("Nothing to count yet")).toBeTruthy();
  });
});
