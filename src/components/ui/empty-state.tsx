import type { ReactNode } from "react";

export type EmptyStateProps = {
  /** What is not there, as a full statement: "No interviews are waiting". */
  title: string;
  /** Why, and what to do about it. */
  children?: ReactNode;
  action?: ReactNode;
};

/** Nothing to show, said in words. The dashed shore line is the same as for "to come" in strips. */
export function EmptyState({ title, children, action }: EmptyStateProps) {
  return (
    <div className="border-y border-dashed border-rule px-4 py-8">
      <p className="text-base font-bold">{title}</p>
      {children ? <div className="mt-1 max-w-[60ch] text-ink-2">{children}</div> : null}
      {action ? <div className="mt-4">{action}</div> : null}
    </div>
  );
}
