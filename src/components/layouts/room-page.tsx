import { type ReactNode, useEffect, useRef } from "react";

export type RoomPageProps = {
  title: string;
  /** What the browser's tab and history say instead of the title: never who somebody is. */
  tabTitle?: string;
  /** Population, range, what the page is about: one quiet line beside the title. */
  subLine?: ReactNode;
  actions?: ReactNode;
  /** A narrow column at the end of wide screens, below the page on small ones. */
  side?: ReactNode;
  sideLabel?: string;
  children: ReactNode;
};

/** A page inside a room. The title takes focus when the page opens, so that readers hear where they are. */
export function RoomPage({
  title,
  tabTitle = title,
  subLine,
  actions,
  side,
  sideLabel = "Beside the page",
  children,
}: RoomPageProps) {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => {
    document.title = `${tabTitle} · Strandline`;
  }, [tabTitle]);
  useEffect(() => {
    // Not over a field that asked for focus itself, and without moving the page.
    if (document.activeElement === document.body) heading.current?.focus({ preventScroll: true });
  }, []);
  return (
    <div className="pt-5 pb-8">
      <div className="mb-4 flex flex-wrap items-baseline gap-x-4 gap-y-2">
        <h1 ref={heading} tabIndex={-1} className="text-2xl">
          {title}
        </h1>
        {subLine ? <p className="min-w-0 text-ink-2">{subLine}</p> : null}
        {actions ? (
          <div className="ms-auto flex flex-wrap gap-2 self-center" data-print="hide">
            {actions}
          </div>
        ) : null}
      </div>
      {side ? (
        <div className="gap-10 lg:grid lg:grid-cols-[minmax(0,1fr)_19rem]">
          <div className="min-w-0">{children}</div>
          <aside
            aria-label={sideLabel}
            className="mt-8 border-t border-rule pt-4 lg:mt-0 lg:border-t-0 lg:border-s lg:ps-6 lg:pt-0"
          >
            {side}
          </aside>
        </div>
      ) : (
        children
      )}
    </div>
  );
}
