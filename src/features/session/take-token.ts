/** Takes a token out of the address bar at once, so that it stays in no history. */
export function takeToken(): string {
  const token = window.location.hash.replace(/^#(token=)?/, "");
  if (token !== "") {
    window.history.replaceState(window.history.state, "", window.location.pathname);
  }
  return token;
}
