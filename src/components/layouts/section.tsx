import { type ReactNode, useId } from "react";

export type SectionProps = {
  title: string;
  /** Population, n, cut-off: quiet words on the line of the title. */
  subLine?: ReactNode;
  actions?: ReactNode;
  level?: 2 | 3;
  children: ReactNode;
};

/** A part of a page under its own heading; a named region for readers. */
export function Section({ title, subLine, actions, level = 2, children }: SectionProps) {
  const id = useId();
  const Heading = level === 2 ? "h2" : "h3";
  return (
    <section aria-labelledby={id} className="mb-8">
      <div className="mb-2 flex flex-wrap items-baseline gap-x-3 gap-y-1">
        <Heading id={id} className={level === 2 ? "text-[1.0625rem]" : "text-[0.9375rem]"}>
          {title}
        </Heading>
        {subLine ? <p className="text-sm text-ink-2">{subLine}</p> : null}
        {actions ? <div className="ms-auto flex flex-wrap gap-2">{actions}</div> : null}
      </div>
      {children}
    </section>
  );
}
