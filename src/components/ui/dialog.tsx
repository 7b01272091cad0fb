import { Dialog as Primitive } from "radix-ui";
import { type ReactNode, useRef } from "react";
import { Button } from "./button.tsx";

export type DialogProps = {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: string;
  /** One or two sentences read out with the title. */
  description?: ReactNode;
  children?: ReactNode;
  /** Buttons at the foot, the main one last. */
  actions?: ReactNode;
  size?: "narrow" | "wide";
  /** `alertdialog` for questions that must be answered. */
  role?: "dialog" | "alertdialog";
  closeLabel?: string;
};

/**
 * Modal dialog: focus is held inside and goes back where it came from, Esc closes.
 * The library's own overlay is left out because it injects a style element, which the
 * content-security policy refuses; the page is held still by src/styles/base.css instead.
 */
export function Dialog({
  open,
  onOpenChange,
  title,
  description,
  children,
  actions,
  size = "narrow",
  role = "dialog",
  closeLabel = "Close",
}: DialogProps) {
  const opener = useRef<Element | null>(null);
  return (
    <Primitive.Root open={open} onOpenChange={onOpenChange}>
      <Primitive.Portal>
        <div className="veil fixed inset-0 z-40" aria-hidden="true" />
        <Primitive.Content
          role={role}
          onOpenAutoFocus={(event) => {
            opener.current = document.activeElement;
            focusFirst(event);
          }}
          onCloseAutoFocus={(event) => {
            // The library gives focus back to a trigger of its own only, and ours has none.
            event.preventDefault();
            if (opener.current instanceof HTMLElement) opener.current.focus();
          }}
          aria-modal="true"
          data-dialog="open"
          {...(description ? {} : { "aria-describedby": undefined })}
          className={`fixed inset-x-0 bottom-0 z-50 mx-auto flex max-h-[92dvh] w-full flex-col
            border-t-2 border-ink bg-paper text-ink sm:bottom-auto sm:top-[8vh] sm:max-h-[84vh]
            sm:border ${size === "wide" ? "sm:max-w-3xl" : "sm:max-w-lg"}`}
        >
          <div className="flex items-start justify-between gap-4 border-b border-rule px-5 py-3">
            <Primitive.Title className="text-lg">{title}</Primitive.Title>
            <Primitive.Close asChild>
              <Button variant="plain" size="small">
                {closeLabel}
              </Button>
            </Primitive.Close>
          </div>
          <div className="min-h-0 overflow-y-auto px-5 py-4">
            {description ? (
              <Primitive.Description asChild>
                <div className="mb-3 text-ink-2">{description}</div>
              </Primitive.Description>
            ) : null}
            {children}
          </div>
          {actions ? (
            <div
              data-dialog-actions=""
              className="flex flex-wrap justify-end gap-2 border-t border-rule px-5 py-3"
            >
              {actions}
            </div>
          ) : null}
        </Primitive.Content>
      </Primitive.Portal>
    </Primitive.Root>
  );
}

/** Focus goes to the first field, else to the first button at the foot; "Close" comes last. */
function focusFirst(event: Event) {
  const content = event.currentTarget;
  if (!(content instanceof HTMLElement)) return;
  const field = content.querySelector<HTMLElement>(
    "input:not(:disabled),select:not(:disabled),textarea:not(:disabled)",
  );
  const target = field ?? content.querySelector<HTMLElement>("[data-dialog-actions] button");
  if (!target) return;
  event.preventDefault();
  target.focus();
}
