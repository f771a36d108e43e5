import { defineConfig, devices } from "@playwright/test";
import { launchOptions } from "../support/browser";

// `npm test -- e2e` builds, serves on a free port with a database of its own and sets SLACKWATER_URL.
const url = process.env.SLACKWATER_URL;
if (!url) throw new Error("SLACKWATER_URL is not set: run `npm test -- e2e`, or set it to a running server with demo data");

export default defineConfig({
  testDir: ".",
  outputDir: "../../test-results",
  fullyParallel: false,
  workers: 1,
  forbidOnly: Boolean(process.env.CI),
  timeout: 60_000,
  expect: { timeout: 10_000 },
  // PLAYWRIGHT_JSON_OUTPUT_FILE says where the second one goes
  reporter: process.env.PLAYWRIGHT_JSON_OUTPUT_FILE ? [["list"], ["json"]] : [["list"]],
  use: {
    ...devices["Desktop Chrome"],
    baseURL: url,
    viewport: { width: 1440, height: 900 },
    launchOptions,
    trace: "retain-on-failure",
    screenshot: "only-on-failure",
  },
});
