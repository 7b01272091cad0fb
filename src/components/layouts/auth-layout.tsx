import type { ReactNode } from "react";
import { Wordmark } from "./wordmark.tsx";

export type AuthLayoutProps = {
  title: string;
  children: ReactNode;
  /** Caution and demo accounts, under the form. */
  footer?: ReactNode;
};

/** Sign-in and first account: the name, a shore of tide marks, one form. */
export function AuthLayout({ title, children, footer }: AuthLayoutProps) {
  return (
    <div className="flex min-h-dvh flex-col">
      <main id="main" className="mx-auto w-full max-w-md flex-1 px-5 pt-[9vh] pb-10">
        <Wordmark size="large" />
        <TideLines />
        <h1 className="mb-4 text-xl">{title}</h1>
        {children}
      </main>
      {footer ? (
        <footer className="border-t border-rule">
          <div className="mx-auto max-w-md px-5 py-4 text-sm text-ink-2">{footer}</div>
        </footer>
      ) : null}
    </div>
  );
}

/** Lines left by falling water, each fainter than the last. Decoration only. */
function TideLines() {
  return (
    <svg viewBox="0 0 400 34" className="mt-3 mb-8 block w-full" aria-hidden="true">
      {[1, 0.6, 0.3].map((strength, line) => (
        <path
          key={strength}
          d={`M0 ${8 + line * 9}c34 0 46-6 84-6s48 7 92 7 58-6 100-6 50 5 124 5`}
          fill="none"
          stroke={line === 0 ? "var(--kelp)" : "var(--ink-2)"}
          strokeWidth={line === 0 ? 1.5 : 1}
          opacity={strength}
        />
      ))}
    </svg>
  );
}
