import { defineConfig } from "vitest/config";

const root = new URL("..", import.meta.url).pathname;

export default defineConfig({
  // The built program finds its arithmetic in dist/; tests of the sources take the source.
  resolve: { alias: { "#math-units": `${root}src/scenario/mathUnits.ts` } },
  test: {
    root,
    include: ["test/**/*.test.ts"],
    setupFiles: ["test/setup/seed.ts"],
    globalSetup: "test/setup/build.ts",
    testTimeout: 60_000,
  },
});
