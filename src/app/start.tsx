import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { RouterProvider } from "react-router-dom";
import { Providers } from "./providers.tsx";
import { createRouter } from "./router.tsx";

/** Draws the application into the page. */
export function start(): void {
  const root = document.getElementById("root");
  if (!root) throw new Error("the page has no root");
  createRoot(root).render(
    <StrictMode>
      <Providers>
        <RouterProvider router={createRouter()} />
      </Providers>
    </StrictMode>,
  );
}
