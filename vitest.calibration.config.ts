import { defineConfig } from "vitest/config";

// `npm run test:calibration`: simulations that take minutes and are no part of `npm test`.
export default defineConfig({
  test: {
    name: "calibration",
    include: ["tests/calibration/**/*.test.ts"],
    setupFiles: ["tests/support/guards.ts"],
    maxWorkers: 2,
    testTimeout: 900_000,
  },
});
