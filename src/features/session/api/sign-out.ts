import { api } from "../../../lib/api-client.ts";
import { keepingLooks } from "../../../lib/remembered.ts";
import { tellOtherTabs } from "../session-channel.ts";

/**
 * Signs out and loads the sign-in page anew, so that nothing read or typed stays in memory. The
 * server also empties this site's storage; the theme and the like are put back.
 */
export async function signOut(): Promise<void> {
  await keepingLooks(() => api.delete("/api/session"));
  tellOtherTabs();
  window.location.assign("/sign-in");
}
