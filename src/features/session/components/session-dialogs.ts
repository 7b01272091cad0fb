import { lazy } from "react";

/** Well after the room has come: fetched while there is a signal, and no part of its first load. */
const fetchAfterMs = 20_000;

const loadLock = () => import("./lock-page.tsx");
const loadWarning = () => import("./idle-warning.tsx");
const loadElsewhere = () => import("./acts-elsewhere.tsx");

export const LockPage = lazy(() => loadLock().then((file) => ({ default: file.LockPage })));
export const IdleWarning = lazy(() =>
  loadWarning().then((file) => ({ default: file.IdleWarning })),
);
export const ActsElsewhere = lazy(() =>
  loadElsewhere().then((file) => ({ default: file.ActsElsewhere })),
);

/** Fetches the dialogs ahead of need; returns the way to stop. */
export function fetchSessionDialogs(): () => void {
  const timer = setTimeout(() => {
    for (const load of [loadLock, loadWarning, loadElsewhere]) load().catch(() => {});
  }, fetchAfterMs);
  return () => clearTimeout(timer);
}
