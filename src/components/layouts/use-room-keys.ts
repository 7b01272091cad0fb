import { useEffect } from "react";

/** True when keys typed there are text, so that no shortcut may fire. */
export function isTypingTarget(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable) return true;
  return /^(input|textarea|select)$/i.test(target.tagName);
}

/**
 * Alt with a digit opens a room. Never in a field, never with a dialog open, and off where the
 * reader switched it off (WCAG 2.1.4). The physical key counts, since Alt changes the character on
 * some keyboards.
 */
export function useRoomKeys(
  rooms: readonly { digit: number; to: string }[],
  enabled: boolean,
  open: (to: string) => void,
): void {
  useEffect(() => {
    if (!enabled) return;
    function onKeyDown(event: KeyboardEvent) {
      if (!event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
      if (isTypingTarget(event.target) || document.querySelector("[data-dialog='open']")) return;
      const digit = /^(?:Digit|Numpad)(\d)$/.exec(event.code)?.[1] ?? event.key;
      const room = rooms.find((candidate) => String(candidate.digit) === digit);
      if (!room) return;
      event.preventDefault();
      open(room.to);
    }
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [rooms, enabled, open]);
}
