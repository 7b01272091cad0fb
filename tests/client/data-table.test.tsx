// @vitest-environment jsdom
import { cleanup, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { MemoryRouter, Route, Routes, useLocation } from "react-router-dom";
import { afterEach, describe, expect, it, vi } from "vitest";
import {
  type DataColumn,
  parseSortParameter,
  type SortState,
  sortParameter,
} from "../../src/components/data-table/data-column.ts";
import { DataTable, type DataTableProps } from "../../src/components/data-table/data-table.tsx";
import { Answer } from "../../src/components/ui/answer.tsx";

afterEach(cleanup);

type Row = { id: string; study: string; onset: string; pairs: number | null };

const rows: readonly Row[] = [
  { id: "a", study: "D-1", onset: "2026-05-18", pairs: 4 },
  { id: "b", study: "D-2", onset: "", pairs: null },
  { id: "c", study: "D-3", onset: "refused", pairs: 0 },
];

const columns: readonly DataColumn<Row>[] = [
  { id: "study", header: "Study number", cell: (row) => row.study },
  {
    id: "onset",
    header: "Onset",
    cell: (row) => <Answer value={row.onset} />,
    sortKey: "onsetDate",
  },
  {
    id: "pairs",
    header: "Pairs",
    cell: (row) => <Answer kind="figure" value={row.pairs} reason="not interviewed" />,
    numeric: true,
    sortKey: "pairs",
  },
];

function Where() {
  return <output>{useLocation().pathname}</output>;
}

function Page(given: Partial<DataTableProps<Row>>) {
  const [sort, setSort] = useState<SortState>(null);
  const [hidden, setHidden] = useState<string[]>([]);
  return (
    <MemoryRouter>
      <DataTable
        caption="People on record"
        noun="people"
        columns={columns}
        rows={rows}
        rowId={(row) => row.id}
        total={60}
        page={1}
        pageSize={25}
        onPageChange={() => {}}
        sort={sort}
        onSortChange={setSort}
        hiddenColumns={hidden}
        onHiddenColumnsChange={setHidden}
        {...given}
      />
      <Routes>
        <Route path="*" element={<Where />} />
      </Routes>
    </MemoryRouter>
  );
}

describe("data table", () => {
  it("asks the server for an order and says which one stands", async () => {
    const user = userEvent.setup();
    render(<Page />);
    const table = screen.getByRole("table", { name: "People on record" });
    const head = () => within(table).getByRole("columnheader", { name: "Onset" });
    expect(head().getAttribute("aria-sort")).toBe("none");
    const press = () => user.click(within(head()).getByRole("button"));
    await press();
    expect(head().getAttribute("aria-sort")).toBe("ascending");
    await press();
    expect(head().getAttribute("aria-sort")).toBe("descending");
    await press();
    expect(head().getAttribute("aria-sort")).toBe("none");
    const plain = within(table).getByRole("columnheader", { name: "Study number" });
    expect(plain.hasAttribute("aria-sort")).toBe(false);
    // The rows stay as the server gave them.
    const firsts = within(table)
      .getAllByRole("rowheader")
      .map((cell) => cell.textContent);
    expect(firsts).toEqual(["D-1", "D-2", "D-3"]);
  });

  it("keeps missing, not asked, refused and 0 apart", () => {
    render(<Page />);
    const cells = (name: string) =>
      within(screen.getByRole("row", { name: new RegExp(name) }))
        .getAllByRole("cell")
        .map((cell) => cell.textContent);
    expect(cells("D-2")).toEqual(["not asked", "—not interviewed"]);
    expect(cells("D-3")).toEqual(["refused", "0"]);
  });

  it("is walked and opened by keyboard, with one row in the tab order", async () => {
    const user = userEvent.setup();
    render(<Page rowTo={(row) => `/trace/${row.id}`} />);
    const [, first, second, third] = screen.getAllByRole("row");
    expect([first, second, third].map((row) => row?.tabIndex)).toEqual([0, -1, -1]);
    first?.focus();
    await user.keyboard("{ArrowDown}{ArrowDown}{ArrowDown}");
    expect(document.activeElement).toBe(third);
    await user.keyboard("{Home}{ArrowDown}");
    expect(document.activeElement).toBe(second);
    await user.keyboard("{Enter}");
    expect(screen.getByRole("status").textContent).toBe("/trace/b");
  });

  it("opens a row by a click beside its link too", async () => {
    const user = userEvent.setup();
    const open = vi.fn();
    render(<Page onRowOpen={open} />);
    await user.click(screen.getByText("refused"));
    expect(open).toHaveBeenCalledWith(rows[2]);
  });

  it("hides and shows columns, but not the one that names the row", async () => {
    const user = userEvent.setup();
    render(<Page />);
    await user.click(screen.getByRole("button", { name: "Columns" }));
    const choice = screen.getByRole("dialog", { name: "Columns shown" });
    expect(within(choice).queryByRole("checkbox", { name: "Study number" })).toBeNull();
    await user.click(within(choice).getByRole("checkbox", { name: "Onset" }));
    await user.keyboard("{Escape}");
    expect(screen.queryByRole("columnheader", { name: "Onset" })).toBeNull();
    expect(screen.queryByText("refused")).toBeNull();
  });

  it("pages, and says what part is shown", async () => {
    const user = userEvent.setup();
    const onPageChange = vi.fn();
    render(<Page page={3} onPageChange={onPageChange} />);
    const pages = screen.getByRole("navigation", { name: "Pages of people" });
    expect(pages.textContent).toContain("51–60 of 60 people");
    expect(within(pages).getByRole("button", { name: "Next" }).hasAttribute("disabled")).toBe(true);
    await user.click(within(pages).getByRole("button", { name: "Previous" }));
    expect(onPageChange).toHaveBeenCalledWith(2);
  });

  it("has words for loading, for an error with a way on, and for nothing", async () => {
    const user = userEvent.setup();
    const retry = vi.fn();
    const { rerender } = render(<Page state="loading" />);
    expect(screen.getAllByRole("status")[0]?.textContent).toContain("Loading people");
    rerender(<Page state="error" errorKind="error" onRetry={retry} />);
    await user.click(within(screen.getByRole("alert")).getByRole("button", { name: "Try again" }));
    expect(retry).toHaveBeenCalledOnce();
    rerender(<Page rows={[]} total={0} />);
    expect(screen.getByText("No people to show")).toBeTruthy();
  });
});

describe("sort parameter", () => {
  it("goes there and back", () => {
    for (const text of ["onsetDate", "-onsetDate"]) {
      expect(sortParameter(parseSortParameter(text))).toBe(text);
    }
    expect(parseSortParameter("")).toBeNull();
    expect(parseSortParameter("-")).toBeNull();
    expect(sortParameter(null)).toBeUndefined();
  });
});
