// Sets the remembered theme before the first paint. A file of its own because the
// content-security policy allows no inline script. Same key and values as src/lib/theme.ts.
try {
  var choice = localStorage.getItem("strandline.theme");
  if (choice === "light" || choice === "dark") {
    document.documentElement.setAttribute("data-theme", choice);
  }
} catch {
  // Storage can be closed by the browser's settings; the system theme then stands.
}
