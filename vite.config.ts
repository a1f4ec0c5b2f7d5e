import { defineConfig } from "vitest/config";

export default defineConfig({
  test: {
    projects: [
      {
        extends: true,
        test: { name: "shared", include: ["tests/walls.test.ts", "tests/shared/**/*.test.ts"], environment: "node" },
      },
      {
        extends: true,
        test: {
          name: "server",
          include: ["tests/server/**/*.test.ts", "tests/golden/**/*.test.ts"],
          environment: "node",
          testTimeout: 120_000,
        },
      },
    ],
    reporters: ["default", "./tests/reporter.ts"],
  },
});
