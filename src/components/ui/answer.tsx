import type { ReactNode } from "react";

export type AnswerProps = {
  /** A stored value: "" or null = not asked; the words unknown and refused; anything else is shown. */
  value: string | number | null | undefined;
  /** How an ordinary value is written; as it is by default. */
  format?: (value: string | number) => ReactNode;
  /** `answer` for what a person was asked; `figure` for a number that could not be worked out. */
  kind?: "answer" | "figure";
  /** Why a figure is missing, read out and shown on hover. */
  reason?: string;
};

/** One value of a record. Not asked, unknown and refused are three things, and "—" is not 0. */
export function Answer({ value, format, kind = "answer", reason }: AnswerProps) {
  if (value === null || value === undefined || value === "") {
    if (kind === "figure") {
      return (
        <span className="text-ink-2" title={reason}>
          <span aria-hidden="true">—</span>
          <span className="sr-only">{reason ?? "no value"}</span>
        </span>
      );
    }
    return <span className="text-ink-2">not asked</span>;
  }
  if (kind === "answer" && (value === "unknown" || value === "refused")) {
    return <em className="text-ink-2">{value}</em>;
  }
  return <>{format ? format(value) : value}</>;
}
