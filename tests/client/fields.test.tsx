// @vitest-environment jsdom
import { cleanup, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { Controller, useForm } from "react-hook-form";
import { afterEach, describe, expect, it, vi } from "vitest";
import { CheckboxField } from "../../src/components/fields/checkbox-field.tsx";
import { NumberField } from "../../src/components/fields/number-field.tsx";
import { PartialDateField } from "../../src/components/fields/partial-date-field.tsx";
import { PhoneField } from "../../src/components/fields/phone-field.tsx";
import { RadioRow } from "../../src/components/fields/radio-row.tsx";
import { SelectField } from "../../src/components/fields/select-field.tsx";
import { TextField } from "../../src/components/fields/text-field.tsx";

afterEach(cleanup);

describe("field frame", () => {
  it("ties label, hint and error to the box", () => {
    render(<TextField label="E-mail" hint="For the report." error="Not an address." />);
    const box = screen.getByRole("textbox", { name: "E-mail" });
    expect(box.getAttribute("aria-invalid")).toBe("true");
    const ids = (box.getAttribute("aria-describedby") ?? "").split(" ");
    const said = ids.map((id) => document.getElementById(id)?.textContent).join(" ");
    expect(said).toBe("Check: Not an address. For the report.");
  });

  it("says nothing of errors when there is none", () => {
    render(<TextField label="Name" />);
    const box = screen.getByRole("textbox", { name: "Name" });
    expect(box.hasAttribute("aria-invalid")).toBe(false);
    expect(box.hasAttribute("aria-describedby")).toBe(false);
  });
});

function Form({ saved }: { saved: (values: unknown) => void }) {
  const form = useForm({
    defaultValues: { name: "", minutes: "", setting: "", sex: "", physical: false, onset: "" },
  });
  return (
    <form onSubmit={form.handleSubmit((values) => saved(values))}>
      <TextField
        label="Name"
        {...form.register("name", { required: "Give a name." })}
        error={form.formState.errors.name?.message}
      />
      <NumberField label="Duration" unit="minutes" {...form.register("minutes")} />
      <SelectField
        label="Setting"
        emptyLabel="not asked"
        options={[{ value: "household", label: "household" }]}
        {...form.register("setting")}
      />
      <RadioRow
        label="Sex"
        options={[
          { value: "female", label: "female" },
          { value: "male", label: "male" },
        ]}
        {...form.register("sex")}
      />
      <CheckboxField label="Physical" {...form.register("physical")} />
      <Controller
        control={form.control}
        name="onset"
        render={({ field }) => <PartialDateField label="Onset" {...field} />}
      />
      <button type="submit">Save</button>
    </form>
  );
}

describe("with a form", () => {
  it("registers every kind of field and focuses the first wrong one", async () => {
    const saved = vi.fn();
    const user = userEvent.setup();
    render(<Form saved={saved} />);
    await user.click(screen.getByRole("button", { name: "Save" }));
    const name = screen.getByRole("textbox", { name: "Name" });
    expect(document.activeElement).toBe(name);
    expect(saved).not.toHaveBeenCalled();

    await user.type(name, "Ada");
    await user.type(screen.getByRole("textbox", { name: "Duration (minutes)" }), "45");
    await user.selectOptions(screen.getByRole("combobox", { name: "Setting" }), "household");
    await user.click(screen.getByRole("radio", { name: "male" }));
    await user.click(screen.getByRole("checkbox", { name: "Physical" }));
    await user.type(screen.getByRole("textbox", { name: "Onset" }), "20260518");
    await user.click(screen.getByRole("button", { name: "Save" }));
    expect(saved.mock.calls[0]?.[0]).toEqual({
      name: "Ada",
      minutes: "45",
      setting: "household",
      sex: "male",
      physical: true,
      onset: "2026-05-18",
    });
  });
});

function Dated({ onValue }: { onValue: (value: string) => void }) {
  const [value, setValue] = useState("");
  return (
    <PartialDateField
      label="Onset"
      today="2026-05-27"
      value={value}
      onChange={(next) => {
        setValue(next);
        onValue(next);
      }}
    />
  );
}

describe("partial date", () => {
  it("keeps not asked, unknown and refused apart, in words", async () => {
    const user = userEvent.setup();
    const onValue = vi.fn();
    render(<Dated onValue={onValue} />);
    expect(screen.getByText("not asked")).toBeTruthy();

    const unknown = screen.getByRole("button", { name: "Onset: unknown" });
    await user.click(unknown);
    expect(onValue).toHaveBeenLastCalledWith("unknown");
    expect(unknown.getAttribute("aria-pressed")).toBe("true");
    expect(screen.getByText("asked, not known")).toBeTruthy();

    await user.click(screen.getByRole("button", { name: "Onset: refused" }));
    expect(onValue).toHaveBeenLastCalledWith("refused");
    expect(unknown.getAttribute("aria-pressed")).toBe("false");

    await user.click(screen.getByRole("button", { name: "Onset: refused" }));
    expect(onValue).toHaveBeenLastCalledWith("");
    expect(screen.getByText("not asked")).toBeTruthy();
  });

  it("is filled by keyboard alone: days back, a letter, a month", async () => {
    const user = userEvent.setup();
    const onValue = vi.fn();
    render(<Dated onValue={onValue} />);
    const box = screen.getByRole("textbox", { name: "Onset" });
    await user.type(box, "-3{Enter}");
    expect(onValue).toHaveBeenLastCalledWith("2026-05-24");
    await user.clear(box);
    await user.type(box, "u");
    await user.tab();
    expect(onValue).toHaveBeenLastCalledWith("unknown");
    await user.clear(box);
    await user.type(box, "2026-05");
    await user.tab();
    expect(onValue).toHaveBeenLastCalledWith("2026-05");
    expect(screen.getByText(/day not known/)).toBeTruthy();
  });

  it("shows what it cannot read, and only after the field is left", async () => {
    const user = userEvent.setup();
    render(<Dated onValue={() => {}} />);
    const box = screen.getByRole("textbox", { name: "Onset" });
    await user.type(box, "5/6");
    expect(box.hasAttribute("aria-invalid")).toBe(false);
    await user.tab();
    expect(box.getAttribute("aria-invalid")).toBe("true");
    expect(screen.getByText(/Write YYYY-MM-DD, YYYY-MM, unknown or refused/)).toBeTruthy();
    expect((box as HTMLInputElement).value).toBe("5/6");
  });
});

describe("phone", () => {
  it("keeps what is typed and offers the two answers", async () => {
    const user = userEvent.setup();
    const onChange = vi.fn();
    render(<PhoneField label="Phone" value="" onChange={onChange} />);
    await user.type(screen.getByRole("textbox", { name: "Phone" }), "0");
    expect(onChange).toHaveBeenLastCalledWith("0");
    await user.click(screen.getByRole("button", { name: "Phone: refused" }));
    expect(onChange).toHaveBeenLastCalledWith("refused");
  });
});
