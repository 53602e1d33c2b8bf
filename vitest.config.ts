import path from "node:path";
import { defineConfig } from "vitest/config";

const root = import.meta.dirname;

/** The same names that the sources import; `server-only` throws outside the bundler. */
const alias = {
  "server-only": path.join(root, "tests/support/empty.ts"),
  "@": root,
};

const shared = { environment: "node" as const, pool: "forks" as const, restoreMocks: true };

export default defineConfig({
  resolve: { alias },
  test: {
    projects: [
      {
        extends: true,
        test: {
          ...shared,
          name: "unit",
          include: ["modules/**/*.test.{ts,tsx}", "tests/fakes/**/*.test.ts", "scripts/**/*.test.ts", "db/**/*.test.ts", "seed/**/*.test.ts"],
          exclude: ["**/*.int.test.ts", "**/node_modules/**"],
          // Stand-ins speak over real sockets: a loaded machine must not make them fail.
          testTimeout: 20_000,
        },
      },
      { extends: true, test: { ...shared, name: "architecture", include: ["tests/architecture/**/*.test.ts"], exclude: ["**/*.int.test.ts"], testTimeout: 60_000 } },
      { extends: true, test: { ...shared, name: "checks", include: ["tests/checks/**/*.test.ts"] } },
      {
        extends: true,
        test: {
          ...shared,
          name: "integration",
          include: ["{modules,db,seed,app,worker,tests}/**/*.int.test.ts"],
          exclude: ["**/node_modules/**"],
          globalSetup: ["tests/support/template-database.ts"],
          setupFiles: ["tests/support/worker-environment.ts"],
          testTimeout: 30_000,
          hookTimeout: 60_000,
        },
      },
    ],
  },
});
