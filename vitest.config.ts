import { defineConfig } from "vitest/config";

// Tests run against the sources; kernels.wasm and the worker threads come from dist/ (npm run build).
export default defineConfig({
  test: {
    include: ["test/**/*.test.ts"],
    testTimeout: 120_000,
    hookTimeout: 120_000,
    maxWorkers: 2,
  },
});
