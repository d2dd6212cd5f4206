import { reactRouter } from "@react-router/dev/vite";
import tailwindcss from "@tailwindcss/vite";
import { defineConfig } from "vitest/config";
import { compressedAssets } from "./scripts/compressed-assets.js";
import { workerBuild } from "./scripts/worker-build.js";

const isTest = process.env.VITEST === "true";

export default defineConfig({
  plugins: isTest ? [] : [tailwindcss(), reactRouter(), workerBuild(), compressedAssets()],
  build: { sourcemap: false },
  test: {
    projects: [
      // The time limits are for a slow or busy machine: nothing here is timed.
      {
        test: {
          name: "unit",
          include: ["tests/unit/**/*.test.{ts,tsx}"],
          environment: "node",
          testTimeout: 60_000,
        },
      },
      {
        test: { name: "external", include: ["tests/external/**/*.test.ts"], environment: "node", testTimeout: 60_000 },
      },
      {
        test: {
          name: "integration",
          include: ["tests/integration/**/*.test.ts"],
          globalSetup: ["tests/support/built-app.ts"],
          pool: "forks",
          fileParallelism: true,
          maxWorkers: 2,
          testTimeout: 60_000,
          hookTimeout: 60_000,
        },
      },
      {
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          globalSetup: ["tests/support/whole-system.ts"],
          pool: "forks",
          fileParallelism: false,
          testTimeout: 180_000,
          hookTimeout: 120_000,
        },
      },
    ],
  },
});
