import { defineConfig } from "vitest/config";

export default defineConfig({
  test: { include: ["test/other-editors/**/*.check.ts"], testTimeout: 120_000 },
});
