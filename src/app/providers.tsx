import { QueryClientProvider } from "@tanstack/react-query";
import { type ReactNode, useEffect, useState } from "react";
import { ToastProvider } from "../components/ui/toast-provider.tsx";
import { followActivity } from "../lib/activity.ts";
import { createQueryClient } from "./query-client.ts";

/** What the whole application stands on: the cache, short messages, and who is at the keyboard. */
export function Providers({ children }: { children: ReactNode }) {
  const [queryClient] = useState(createQueryClient);
  useEffect(() => followActivity(), []);
  return (
    <QueryClientProvider client={queryClient}>
      <ToastProvider>{children}</ToastProvider>
    </QueryClientProvider>
  );
}
