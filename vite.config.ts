import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vite";

/**
 * Client build. Nothing is inlined and no polyfill script is injected, because the
 * content-security policy allows scripts, styles, fonts and pictures from our own files only.
 * In development the Express process runs this server as middleware, so there is no proxy.
 */
export default defineConfig({
  plugins: [react(), tailwindcss()],
  build: {
    outDir: "dist/client",
    emptyOutDir: true,
    assetsInlineLimit: 0,
    modulePreload: { polyfill: false },
    target: "es2022",
  },
});
