// `npm test [-- PART [arguments]]`: PART is unit, dom, integration or e2e; without one, all of them. Ends with
// "N passed, N failed" over every runner; exit code 1 when anything failed.
import { mkdirSync, readFileSync, rmSync } from "node:fs";
import { join } from "node:path";
import { buildWhenStale, distFolder } from "./build.mjs";
import { Refusal, reportFailure, say, step } from "./messages.mjs";
import { dataFolder, logFolder, makeDataFolder, root } from "./paths.mjs";
import { findAnyPort } from "./ports.mjs";
import { killAll, onStopRequest, run } from "./processes.mjs";
import { findChromium } from "./programs.mjs";
import { startThrowAwayDatabase } from "./throw-away-database.mjs";
import { startWeb } from "./web.mjs";

const PARTS = ["unit", "dom", "integration", "e2e"];
const [asked, ...extra] = process.argv.slice(2);
const parts = asked === undefined || asked === "all" ? PARTS : [asked];
const reportFolder = join(dataFolder, "test-reports");

// what to end, last begun first
const endings = [];

async function test() {
  if (!PARTS.includes(parts[0])) throw new Refusal(`No part '${asked}': choose from ${PARTS.join(", ")}.`);
  makeDataFolder();
  rmSync(reportFolder, { recursive: true, force: true });
  mkdirSync(reportFolder, { recursive: true });

  const counts = [];
  const inVitest = parts.filter((part) => part !== "e2e");
  const database = parts.some((part) => part === "integration" || part === "e2e") ? await startThrowAwayDatabase() : null;
  if (database) endings.push(database.stop);
  if (inVitest.length > 0) counts.push(await runVitest(inVitest, database));
  if (parts.includes("e2e")) counts.push(await runPlaywright(database));
  return counts.reduce((sum, count) => ({
    passed: sum.passed + count.passed,
    failed: sum.failed + count.failed,
    skipped: sum.skipped + count.skipped,
  }));
}

async function runVitest(projects, database) {
  const report = join(reportFolder, "vitest.json");
  const urls = projects.includes("integration") ? await database.makeDatabase("slackwater_test") : {};
  const args = ["node_modules/vitest/vitest.mjs", "run", ...projects.flatMap((name) => ["--project", name])];
  const reporters = ["--reporter=default", "--reporter=json", `--outputFile.json=${report}`];
  const code = await run(process.execPath, [...args, ...reporters, ...extra], { cwd: root, env: { ...process.env, ...urls, SLACKWATER_TEST_RUN: "1" } });
  return readCounts(code, report, (json) => ({
    passed: json.numPassedTests,
    failed: json.numFailedTests,
    skipped: json.numPendingTests + json.numTodoTests,
  }));
}

async function runPlaywright(database) {
  await buildWhenStale({ isForTests: true });
  const urls = await step("database with demo data", () => database.makeDatabase("slackwater_e2e", { withSeed: true }));
  const port = await findAnyPort();
  const url = `http://localhost:${port}`;
  const environment = { DATABASE_URL: urls.DATABASE_URL, AUTH_URL: url, AUTH_SECRET: "only-for-one-test-run-on-this-machine", PORT: String(port), SLACKWATER_DEMO: "1" };
  const log = join(logFolder, "web-test.log");
  rmSync(log, { force: true });
  const web = await startWeb({ port, distDir: distFolder(true), environment, log, host: "127.0.0.1" });
  endings.push(web.stop);
  const report = join(reportFolder, "playwright.json");
  const args = ["node_modules/@playwright/test/cli.js", "test", "-c", "tests/e2e/playwright.config.ts", ...extra];
  const env = { ...process.env, ...urls, SLACKWATER_URL: url, SLACKWATER_CHROMIUM: findChromium(), SLACKWATER_TEST_RUN: "1", PLAYWRIGHT_JSON_OUTPUT_FILE: report };
  const code = await run(process.execPath, args, { cwd: root, env });
  return readCounts(code, report, ({ stats }) => ({ passed: stats.expected + stats.flaky, failed: stats.unexpected, skipped: stats.skipped }));
}

/** What a runner reported; a runner that failed without a failed test (or without a report) counts as one failure. */
function readCounts(code, report, pick) {
  try {
    const counts = pick(JSON.parse(readFileSync(report, "utf8")));
    return code !== 0 && counts.failed === 0 ? { ...counts, failed: 1 } : counts;
  } catch (error) {
    reportFailure(`The runner left no report (${error.message}); exit code ${code}.`);
    return { passed: 0, failed: 1, skipped: 0 };
  }
}

async function end(exitCode) {
  killAll();
  for (const ending of endings.splice(0).reverse()) {
    try {
      await ending();
    } catch (error) {
      reportFailure(error);
      exitCode = 1;
    }
  }
  process.exit(exitCode);
}

onStopRequest(() => void end(130));

test().then(
  ({ passed, failed, skipped }) => {
    if (failed > 0) say(`\nLogs: ${logFolder}`);
    if (skipped > 0) say(`${skipped} skipped`);
    say(`${passed} passed, ${failed} failed`);
    return end(failed > 0 ? 1 : 0);
  },
  (error) => {
    reportFailure(error);
    say("0 passed, 1 failed");
    return end(1);
  },
);
