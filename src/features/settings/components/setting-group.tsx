import { type ReactNode, useId } from "react";

export type SettingGroupProps = {
  /** Where the list of groups leads. */
  id: string;
  title: string;
  /** What is decided here, in one sentence. */
  about: string;
  children: ReactNode;
};

/** Settings that are decided together: the name in the margin, the rows beside it. */
export function SettingGroup({ id, title, about, children }: SettingGroupProps) {
  const headingId = useId();
  return (
    <section
      id={id}
      aria-labelledby={headingId}
      className="grid scroll-mt-4 gap-x-8 gap-y-2 border-t border-ink pt-3 pb-6 xl:grid-cols-[13rem_minmax(0,1fr)]"
    >
      <div>
        <h2 id={headingId} className="text-[1.0625rem]">
          {title}
        </h2>
        <p className="mt-1 text-sm text-ink-2">{about}</p>
      </div>
      <div className="min-w-0">{children}</div>
    </section>
  );
}
