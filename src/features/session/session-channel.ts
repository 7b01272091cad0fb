const name = "strandline.session";

/** Tells other tabs of this browser that the session they share has changed. */
export function tellOtherTabs(): void {
  if (typeof BroadcastChannel === "undefined") return;
  const channel = new BroadcastChannel(name);
  channel.postMessage("changed");
  channel.close();
}

/** Calls back when another tab changed the session; returns the way to stop. */
export function onOtherTab(changed: () => void): () => void {
  if (typeof BroadcastChannel === "undefined") return () => {};
  const channel = new BroadcastChannel(name);
  channel.onmessage = changed;
  return () => channel.close();
}
