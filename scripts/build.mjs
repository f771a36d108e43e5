// Builds the application when its sources changed since the last build. `node scripts/build.mjs [--test]` does only that.
import { createHash } from "node:crypto";
import { existsSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { Refusal, reportFailure, say, step, tailOf } from "./messages.mjs";
import { logFolder, makeDataFolder, nextProgram, root, watchedNode } from "./paths.mjs";
import { killAll, onStopRequest, run } from "./processes.mjs";

// tests, scripts and pages of text take no part in a build
const SOURCES = ["app", "components", "lib", "db", "workers", "public"];
export const distFolder = (isForTests) => (isForTests ? ".next-test" : ".next");

function* filesBelow(path) {
  for (const entry of readdirSync(join(root, path), { withFileTypes: true }).sort((a, b) => (a.name < b.name ? -1 : 1))) {
    const inside = join(path, entry.name);
    if (entry.isDirectory()) yield* filesBelow(inside);
    else yield inside;
  }
}

/** A key of everything a build depends on: sources, files at the root (settings, auth, proxy, the lock) and Node. */
export function sourceKey() {
  const hash = createHash("sha256").update(process.version);
  const atRoot = readdirSync(root).filter((name) => /\.(ts|mjs|json)$/.test(name) && name !== "next-env.d.ts").sort();
  const inside = SOURCES.filter((name) => existsSync(join(root, name))).flatMap((name) => [...filesBelow(name)]);
  for (const file of [...atRoot, ...inside]) hash.update(`\n${file}\n`).update(readFileSync(join(root, file)));
  return hash.digest("hex");
}

/** Builds unless the last build is of these very sources. */
export async function buildWhenStale({ isForTests = false } = {}) {
  const folder = distFolder(isForTests);
  const stamp = join(root, folder, "slackwater-sources");
  const key = sourceKey();
  if (existsSync(stamp) && readFileSync(stamp, "utf8") === key) return;
  say("Building the application ...");
  rmSync(stamp, { force: true });
  const log = join(logFolder, isForTests ? "build-test.log" : "build.log");
  const environment = { ...process.env, SLACKWATER_DIST_DIR: folder, SLACKWATER_SKIP_TYPES: "1", NODE_ENV: "production", NEXT_TELEMETRY_DISABLED: "1" };
  const code = await step("next build", () => run(process.execPath, [...watchedNode, nextProgram, "build"], { cwd: root, env: environment, log }));
  if (code !== 0) throw new Refusal(`The build failed (whole log: ${log}):\n${tailOf(log, 40)}`);
  writeFileSync(stamp, key);
}

if (import.meta.url === pathToFileURL(process.argv[1]).href) {
  onStopRequest(() => {
    killAll();
    process.exit(130);
  });
  makeDataFolder();
  buildWhenStale({ isForTests: process.argv.includes("--test") }).catch((error) => {
    reportFailure(error);
    process.exit(1);
  });
}
