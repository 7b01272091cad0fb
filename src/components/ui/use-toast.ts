import { createContext, useContext } from "react";

export type ToastTone = "done" | "info" | "error";

export type ToastMessage = {
  text: string;
  tone?: ToastTone;
  /** A way to follow up, such as "Undo" or "Show". */
  action?: { label: string; run: () => void };
};

export type ShowToast = (message: ToastMessage) => void;

/** Filled by ToastProvider. */
export const ToastContext = createContext<ShowToast | null>(null);

/** Returns the function that shows a short message; throws outside of ToastProvider. */
export function useToast(): ShowToast {
  const show = useContext(ToastContext);
  if (!show) throw new Error("useToast is used outside of ToastProvider");
  return show;
}
