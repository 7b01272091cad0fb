import type { ReactNode } from "react";
import { Button } from "./button.tsx";

export type ErrorKind = "error" | "offline" | "no-permission" | "conflict" | "not-found";

const wording: Record<ErrorKind, { title: string; text: string; retry: string }> = {
  error: {
    title: "This could not be loaded",
    text: "The server did not give an answer that can be used. Nothing was changed.",
    retry: "Try again",
  },
  offline: {
    title: "No connection",
    text: "What you typed is kept in this browser tab. It goes on when the signal is back.",
    retry: "Try again",
  },
  "no-permission": {
    title: "Not open to the role you act in",
    text: "Another role you hold may open it; switch in the header. Otherwise ask a data officer.",
    retry: "",
  },
  conflict: {
    title: "Someone else saved this record first",
    text: "Look at what changed, then save again. Your entries are still in the form.",
    retry: "Show the saved version",
  },
  "not-found": {
    title: "Not on record, or not assigned to you",
    text: "The two look the same on purpose, so that a link gives nothing away.",
    retry: "",
  },
};

export type ErrorStateProps = {
  kind?: ErrorKind;
  title?: string;
  children?: ReactNode;
  onRetry?: () => void;
  retryLabel?: string;
  actions?: ReactNode;
};

/** A page or part that cannot be shown, with what it means for the reader's work. */
export function ErrorState({
  kind = "error",
  title,
  children,
  onRetry,
  retryLabel,
  actions,
}: ErrorStateProps) {
  const words = wording[kind];
  const attention = kind === "error" || kind === "conflict";
  const retry = retryLabel ?? (words.retry === "" ? "Try again" : words.retry);
  return (
    <div
      role={attention ? "alert" : "status"}
      className={`border-y px-4 py-6 ${attention ? "border-coral" : "border-ink-2"}`}
    >
      <p className={`text-base font-bold ${attention ? "text-coral" : ""}`}>
        {title ?? words.title}
      </p>
      <div className="mt-1 max-w-[60ch] text-ink-2">{children ?? words.text}</div>
      {onRetry || actions ? (
        <div className="mt-4 flex flex-wrap gap-2">
          {onRetry ? <Button onClick={onRetry}>{retry}</Button> : null}
          {actions}
        </div>
      ) : null}
    </div>
  );
}
