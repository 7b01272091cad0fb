import { defineConfig } from "vitest/config";

const common = {
  setupFiles: ["tests/support/guards.ts"],
  restoreMocks: true,
  unstubEnvs: true,
  unstubGlobals: true,
};

export default defineConfig({
  test: {
    maxWorkers: 2,
    passWithNoTests: false,
    projects: [
      {
        test: {
          ...common,
          name: "core",
          include: ["tests/core/**/*.test.ts", "tests/architecture/**/*.test.ts"],
          testTimeout: 20_000,
        },
      },
      {
        test: {
          ...common,
          name: "client",
          setupFiles: [...common.setupFiles, "tests/client/support/patience.ts"],
          environment: "jsdom",
          include: ["tests/client/**/*.test.{ts,tsx}"],
          // Typing key by key into a page is slow where other work shares the processor.
          testTimeout: 30_000,
        },
      },
      {
        test: {
          ...common,
          name: "api",
          include: ["tests/{features,policy,server}/**/*.test.ts"],
          globalSetup: ["tests/support/global-setup.ts"],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
