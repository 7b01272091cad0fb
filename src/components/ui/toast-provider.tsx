import { type ReactNode, useCallback, useEffect, useMemo, useRef, useState } from "react";
import { Button } from "./button.tsx";
import { ToastContext, type ToastMessage, type ToastTone } from "./use-toast.ts";

type Shown = ToastMessage & { id: number };

const shownForMs = 6_000;
const mostAtOnce = 3;
const tones: Record<ToastTone, string> = {
  done: "border-kelp",
  info: "border-ink",
  error: "border-coral",
};

/**
 * Short messages at the foot of the page. Errors stay until closed and are read out at once; the
 * rest leave after six seconds, but not while pointed at or focused. Our own because the usual
 * packages inject a style element.
 */
export function ToastProvider({ children }: { children: ReactNode }) {
  const [shown, setShown] = useState<readonly Shown[]>([]);
  const [held, setHeld] = useState(false);
  const nextId = useRef(1);

  const show = useCallback((message: ToastMessage) => {
    const id = nextId.current++;
    setShown((current) => [...current, { ...message, id }].slice(-mostAtOnce));
  }, []);
  const close = useCallback((id: number) => {
    setShown((current) => current.filter((toast) => toast.id !== id));
  }, []);

  const oldest = useMemo(() => shown.find((toast) => toast.tone !== "error"), [shown]);
  useEffect(() => {
    if (!oldest || held) return;
    const timer = setTimeout(() => close(oldest.id), shownForMs);
    return () => clearTimeout(timer);
  }, [oldest, held, close]);

  return (
    <ToastContext value={show}>
      {children}
      {/* biome-ignore lint/a11y/noStaticElementInteractions: pointing only holds the messages back from leaving; nothing is operated by it. */}
      <div
        className="pointer-events-none fixed inset-x-3 bottom-3 z-60 flex flex-col items-end gap-2"
        onMouseEnter={() => setHeld(true)}
        onMouseLeave={() => setHeld(false)}
        onFocus={() => setHeld(true)}
        onBlur={() => setHeld(false)}
      >
        {(["polite", "assertive"] as const).map((urgency) => (
          <div key={urgency} aria-live={urgency} className="flex w-full flex-col items-end gap-2">
            {shown
              .filter((toast) => (toast.tone === "error") === (urgency === "assertive"))
              .map((toast) => (
                <div
                  key={toast.id}
                  className={`pointer-events-auto flex w-full max-w-md items-center gap-3 border
                    border-t-4 bg-paper px-4 py-2 ${tones[toast.tone ?? "info"]}`}
                >
                  <p className="flex-1">{toast.text}</p>
                  {toast.action ? (
                    <Button
                      size="small"
                      onClick={() => {
                        toast.action?.run();
                        close(toast.id);
                      }}
                    >
                      {toast.action.label}
                    </Button>
                  ) : null}
                  <Button size="small" variant="plain" onClick={() => close(toast.id)}>
                    Close
                  </Button>
                </div>
              ))}
          </div>
        ))}
      </div>
    </ToastContext>
  );
}
