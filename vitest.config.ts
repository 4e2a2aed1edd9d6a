import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";

/** Projects by what they need: nothing, a browser-like document, MariaDB, or MariaDB and Chromium. */
export default defineConfig({
  test: {
    reporters: ["default"],
    projects: [
      {
        test: {
          name: "unit",
          include: ["tests/{statistics,microdata,questions,shared,seeds,house}/**/*.test.ts"],
          testTimeout: 60_000,
        },
      },
      {
        plugins: [react()],
        test: {
          name: "pages",
          environment: "jsdom",
          include: ["tests/pages/**/*.test.{ts,tsx}"],
          setupFiles: ["tests/pages/setup.ts"],
          testTimeout: 20_000,
        },
      },
      {
        test: {
          name: "api",
          include: ["tests/{api,faults,reference}/**/*.test.ts"],
          globalSetup: ["tests/support/databaseServer.ts"],
          fileParallelism: false,
          expect: { poll: { timeout: 10_000 } },
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        test: {
          name: "browser",
          include: ["tests/browser/**/*.test.ts"],
          globalSetup: ["tests/support/databaseServer.ts"],
          fileParallelism: false,
          expect: { poll: { timeout: 10_000 } },
          testTimeout: 180_000,
          hookTimeout: 180_000,
        },
      },
    ],
  },
});
