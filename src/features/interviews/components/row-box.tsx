import { clsx } from "clsx";
import { type ComponentProps, type ReactNode, useId } from "react";
import { fieldWords } from "../../../lib/form-errors.ts";

/** Where a box stands, for moving about by keys. */
export interface BoxPlace {
  list: "contacts" | "groupExposures";
  row: number;
  box: string;
}

export interface RowBoxFrame {
  place: BoxPlace;
  label: string;
  /** The full meaning, read out instead of the short head. */
  meaning?: string | undefined;
  /** Error code of this box. */
  error?: string | undefined;
  /** Id of the words that mark this box as worth a second look. */
  noticeId?: string | undefined;
  className?: string | undefined;
  /** Show the label on wide screens too, where the column has no head. */
  labelAlways?: boolean | undefined;
  /** Under the box on screens under a thumb. */
  chips?: ReactNode;
}

/** Attributes by which the row keys find a box. */
export function placeAttributes({ list, row, box }: BoxPlace) {
  return { "data-list": list, "data-row": row, "data-box": box };
}

/** Label (seen where rows are stacked), box, chips and error of one box in a row. */
export function BoxFrame({
  id,
  frame,
  children,
}: {
  id: string;
  frame: RowBoxFrame;
  children: ReactNode;
}) {
  return (
    <div className={clsx("min-w-0", frame.className)}>
      <label
        htmlFor={id}
        className={clsx(
          "mb-0.5 block text-sm text-ink-2",
          !frame.labelAlways && "min-[85rem]:sr-only",
        )}
      >
        {frame.meaning ? (
          <>
            <span aria-hidden="true">{frame.label}</span>
            <span className="sr-only">{frame.meaning}</span>
          </>
        ) : (
          frame.label
        )}
      </label>
      {children}
      {frame.chips}
      {frame.error ? (
        <p id={`${id}-error`} className="mt-0.5 text-sm text-coral">
          {fieldWords(frame.error)}
        </p>
      ) : null}
    </div>
  );
}

/** Attributes that box and select share. */
export function boxAttributes(id: string, frame: RowBoxFrame) {
  const described = [frame.error ? `${id}-error` : "", frame.noticeId ?? ""].filter(Boolean);
  return {
    id,
    ...placeAttributes(frame.place),
    "aria-invalid": frame.error ? true : undefined,
    "aria-describedby": described.length > 0 ? described.join(" ") : undefined,
    className: clsx(
      "field-box scroll-mt-80 scroll-mb-24 px-1.5",
      frame.noticeId && !frame.error && "border-ochre",
    ),
  } as const;
}

export type RowBoxProps = RowBoxFrame & Omit<ComponentProps<"input">, "id" | "className">;

/** One text box of a row; spread `register(name)` of the form into it. */
export function RowBox({
  place,
  label,
  meaning,
  error,
  noticeId,
  className,
  labelAlways,
  chips,
  ...input
}: RowBoxProps) {
  const id = useId();
  const frame = { place, label, meaning, error, noticeId, className, labelAlways, chips };
  return (
    <BoxFrame id={id} frame={frame}>
      <input
        type="text"
        autoComplete="off"
        spellCheck={false}
        enterKeyHint="next"
        {...input}
        {...boxAttributes(id, frame)}
      />
    </BoxFrame>
  );
}
