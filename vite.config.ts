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
        test: { name: "shared", include: ["tests/walls.test.ts", "tests/shared/**/*.test.ts"], environment: "node" },
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
          // Each file has a database of its own, some hundred megabytes large.
          maxWorkers: 2,
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
    ],
    reporters: ["default", "./tests/reporter.ts"],
  },
});
