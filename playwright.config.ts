import { defineConfig } from "@playwright/test";

/**
 * Drives Debian's Chromium against a running product: the one that scripts/test.mjs sets up,
 * or any other that BASE_URL names (such as `npm start` in another terminal).
 */
export default defineConfig({
  testDir: "tests/browser",
  outputDir: ".test/browser",
  workers: 1,
  fullyParallel: false,
  retries: 0,
  timeout: 120_000,
  expect: { timeout: 10_000 },
  forbidOnly: Boolean(process.env.CI),
  reporter: process.env.PLAYWRIGHT_JSON_OUTPUT_FILE ? [["list"], ["json"]] : [["list"]],
  use: {
    baseURL: process.env.BASE_URL ?? "http://localhost:3000",
    trace: "off",
    video: "off",
    screenshot: "only-on-failure",
    locale: "en-GB",
    timezoneId: "UTC",
    browserName: "chromium",
    launchOptions: {
      executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
      args: [
        "--no-sandbox",
        "--disable-gpu",
        "--disable-quic",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
        "--disable-dev-shm-usage",
      ],
    },
  },
});
