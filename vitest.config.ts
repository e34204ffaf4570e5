import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    include: ["test/**/*.test.ts"],
    testTimeout: 60_000,
    hookTimeout: 60_000,
    // as many test files at once as there are cores; without it one core stays idle
    maxWorkers: "100%",
  },
});
