import { NoSuchPage } from "./page-error.tsx";

/** An address that leads nowhere. */
export function Component() {
  return (
    <main className="mx-auto max-w-3xl px-4 pt-[9vh]">
      <NoSuchPage />
    </main>
  );
}
