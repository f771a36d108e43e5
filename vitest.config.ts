import react from "@vitejs/plugin-react";
import { defineConfig } from "vitest/config";

// The kind of a test follows from its name: .test.ts runs in Node, .test.tsx in a document, tests/integration on a real PostgreSQL.
const shared = {
  resolve: { alias: { "@": import.meta.dirname } },
  plugins: [react()],
};

export default defineConfig({
  ...shared,
  test: {
    projects: [
      {
        ...shared,
        test: {
          name: "unit",
          environment: "node",
          include: ["tests/unit/**/*.test.ts", "tests/architecture/**/*.test.ts"],
          setupFiles: ["tests/support/unit-setup.ts"],
          testTimeout: 30_000,
        },
      },
      {
        ...shared,
        test: {
          name: "dom",
          testTimeout: 30_000,
          environment: "jsdom",
          include: ["tests/unit/**/*.test.tsx", "tests/dom/**/*.test.{ts,tsx}"],
          setupFiles: ["tests/support/dom-setup.ts"],
        },
      },
      {
        ...shared,
        test: {
          name: "integration",
          environment: "node",
          include: ["tests/integration/**/*.test.ts"],
          globalSetup: ["tests/support/database-setup.ts"],
          testTimeout: 30_000,
          hookTimeout: 60_000,
          // one server and two cores: files run one after the other
          fileParallelism: false,
        },
      },
    ],
  },
});
