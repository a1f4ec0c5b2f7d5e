import tailwindcss from "@tailwindcss/vite";
import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";

export default defineConfig({
  plugins: [react(), tailwindcss()],
  publicDir: "src/public",
  build: {
    outDir: "dist/client",
    emptyOutDir: true,
    // The diff's editor is one lazy chunk of its own and known to be large.
    chunkSizeWarningLimit: 4_000,
  },
  // The same variable that the server reads.
  server: { proxy: { "/api": `http://127.0.0.1:${process.env.PORT ?? 8080}` } },
  test: {
    projects: [
      {
        extends: true,
        test: {
          name: "shared",
          include: ["tests/walls.test.ts", "tests/shared/**/*.test.ts"],
          environment: "node",
          setupFiles: ["tests/helpers/steady-seed.ts"],
          testTimeout: 60_000,
        },
      },
      {
        extends: true,
        test: {
          name: "server",
          include: ["tests/server/cli/**/*.test.ts", "tests/golden/**/*.test.ts"],
          environment: "node",
          testTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: "app",
          include: ["tests/server/**/*.test.ts"],
          exclude: ["tests/server/cli/**"],
          environment: "node",
          globalSetup: ["tests/helpers/migrated-database.ts"],
          // The files that a worker runs share one database, some hundred megabytes large, and the modules.
          isolate: false,
          maxWorkers: 2,
          // Projects of another width run by turns, not side by side.
          sequence: { groupOrder: 1 },
          testTimeout: 60_000,
          hookTimeout: 120_000,
        },
      },
      {
        extends: true,
        test: {
          name: "src",
          include: ["tests/src/**/*.test.{ts,tsx}"],
          environment: "happy-dom",
          setupFiles: ["tests/src/setup.ts"],
        },
      },
      {
        extends: true,
        test: {
          name: "e2e",
          include: ["tests/e2e/**/*.test.ts"],
          environment: "node",
          sequence: { groupOrder: 2 },
          testTimeout: 240_000,
          hookTimeout: 240_000,
        },
      },
    ],
    reporters: ["default", "./tests/reporter.ts"],
  },
});
