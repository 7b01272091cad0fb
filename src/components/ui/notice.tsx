import { clsx } from "clsx";
import type { ReactNode } from "react";

export type NoticeTone = "info" | "done" | "warn" | "error";

const tones: Record<NoticeTone, { border: string; title: string; word: string }> = {
  info: { border: "border-blue", title: "text-blue", word: "Note" },
  done: { border: "border-kelp", title: "text-kelp", word: "Done" },
  warn: { border: "border-ochre", title: "text-ochre", word: "Take care" },
  error: { border: "border-coral", title: "text-coral", word: "Error" },
};

export type NoticeProps = {
  tone?: NoticeTone;
  /** First words; a plain word for the tone by default, so that colour is never alone. */
  title?: string;
  children?: ReactNode;
  actions?: ReactNode;
  className?: string;
};

/** A message in the page, between two hairlines. Errors are read out at once, the rest politely. */
export function Notice({ tone = "info", title, children, actions, className }: NoticeProps) {
  const look = tones[tone];
  return (
    <div
      role={tone === "error" ? "alert" : "status"}
      className={clsx("border-y bg-paper-2 px-3 py-2", look.border, className)}
    >
      <div className="flex flex-wrap items-baseline justify-between gap-x-4 gap-y-2">
        <div className="min-w-0 flex-1 basis-64">
          <strong className={clsx("me-2", look.title)}>{title ?? look.word}</strong>
          {children ? <span>{children}</span> : null}
        </div>
        {actions ? <div className="flex flex-wrap gap-2">{actions}</div> : null}
      </div>
    </div>
  );
}
