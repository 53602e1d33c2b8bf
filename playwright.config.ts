import { defineConfig } from "@playwright/test";

/**
 * The browser journeys. `npm test` (or `npm test -- --only journeys`) starts the product that they walk through and
 * names it here; alone they have nothing to walk through.
 */
const { E2E_BASE_URL, E2E_CHROMIUM, E2E_REPORT, E2E_TRACE } = process.env;
const asRoot = process.getuid?.() === 0;

export default defineConfig({
  testDir: "tests/e2e",
  outputDir: "test-results",
  // The journeys share one product: a step of one may be seen by the next.
  workers: 1,
  fullyParallel: false,
  forbidOnly: true,
  retries: 0,
  timeout: 120_000,
  expect: { timeout: 10_000 },
  reporter: [["list"], ["json", { outputFile: E2E_REPORT ?? "test-results/journeys.json" }]],
  use: {
    baseURL: E2E_BASE_URL ?? "http://localhost:3100",
    browserName: "chromium",
    viewport: { width: 1440, height: 900 },
    locale: "en-US",
    timezoneId: "America/Denver",
    // A trace keeps a copy of the page at every step and takes as long again as the journeys themselves.
    trace: E2E_TRACE ? "retain-on-failure" : "off",
    screenshot: "only-on-failure",
    actionTimeout: 15_000,
    launchOptions: {
      executablePath: E2E_CHROMIUM ?? "/usr/bin/chromium",
      // The browser's own sandbox can't be used by root.
      args: [...(asRoot ? ["--no-sandbox"] : []), "--disable-dev-shm-usage"],
    },
  },
});
