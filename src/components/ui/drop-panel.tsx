import { type ReactNode, useEffect, useId, useRef, useState } from "react";
import { type ButtonSize, buttonClass } from "./button-class.ts";

export type DropPanelProps = {
  /** Words on the button. */
  label: ReactNode;
  /** Names the panel for readers. */
  panelLabel: string;
  size?: ButtonSize;
  /** Given a way to close the panel. */
  children: (close: () => void) => ReactNode;
  className?: string;
};

/**
 * A button with a small panel under it. Our own few lines instead of a positioning library, which
 * would weigh more than a room: the panel hangs at the end of its button and never needs to flip.
 */
export function DropPanel({
  label,
  panelLabel,
  size = "small",
  children,
  className,
}: DropPanelProps) {
  const [open, setOpen] = useState(false);
  const id = useId();
  const wrapper = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  const panel = useRef<HTMLDivElement>(null);

  useEffect(() => {
    if (!open) return;
    panel.current?.querySelector<HTMLElement>("input,select,button,a")?.focus();
    // A press or the focus anywhere else closes it.
    function onElsewhere(event: Event) {
      if (!wrapper.current?.contains(event.target as Node)) setOpen(false);
    }
    function onKeyDown(event: KeyboardEvent) {
      if (event.key !== "Escape") return;
      event.stopPropagation();
      setOpen(false);
      button.current?.focus();
    }
    document.addEventListener("pointerdown", onElsewhere);
    document.addEventListener("focusin", onElsewhere);
    document.addEventListener("keydown", onKeyDown, true);
    return () => {
      document.removeEventListener("pointerdown", onElsewhere);
      document.removeEventListener("focusin", onElsewhere);
      document.removeEventListener("keydown", onKeyDown, true);
    };
  }, [open]);

  return (
    <div ref={wrapper} className="relative min-w-0">
      <button
        ref={button}
        type="button"
        aria-expanded={open}
        aria-controls={open ? id : undefined}
        onClick={() => setOpen((current) => !current)}
        className={buttonClass("quiet", size, "max-w-full")}
      >
        {label}
        <svg viewBox="0 0 8 6" className="size-2 shrink-0" aria-hidden="true">
          <path d="M0 0h8L4 6Z" fill="currentColor" />
        </svg>
      </button>
      {open ? (
        <div
          ref={panel}
          role="dialog"
          id={id}
          aria-label={panelLabel}
          className={`absolute end-0 top-full z-30 mt-1 max-h-[70vh] overflow-y-auto border
            border-ink bg-paper px-4 py-2 text-start ${className ?? "min-w-48"}`}
        >
          {children(() => setOpen(false))}
        </div>
      ) : null}
    </div>
  );
}
