// Installs the packages of package-lock.json when they are not there as the lock says.
import { createHash } from "node:crypto";
import { existsSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { Refusal, say, step, tailOf } from "./messages.mjs";
import { dataFolder, logFolder, root } from "./paths.mjs";
import { readHolder, takeLock } from "./lock.mjs";
import { run, until } from "./processes.mjs";

const stamp = join(root, "node_modules/.slackwater-installed");

/** What an installation depends on: the two package files, and the Node and machine that binaries were chosen for. */
export function installationKey() {
  const hash = createHash("sha256");
  for (const name of ["package.json", "package-lock.json"]) hash.update(readFileSync(join(root, name)));
  const { node, modules } = process.versions;
  return hash.update(`${node.split(".")[0]} ${modules} ${process.platform} ${process.arch}`).digest("hex");
}

const isInstalled = () => existsSync(stamp) && readFileSync(stamp, "utf8") === installationKey();

export async function installPackages() {
  if (isInstalled()) return;
  const lockFile = join(dataFolder, "install.lock");
  let lock = takeLock(lockFile);
  if (lock.holder) {
    say(`Waiting for another installation (process ${lock.holder.pid}) ...`);
    await until(() => readHolder(lockFile) === null, 600_000, 500);
    if (isInstalled()) return;
    lock = takeLock(lockFile);
    if (lock.holder) throw new Refusal(`Another installation (process ${lock.holder.pid}) is still running.`);
  }
  try {
    say("Installing packages ...");
    await step("npm ci", runNpmCi);
    // last, so that an installation that was cut short is done again
    writeFileSync(stamp, installationKey());
  } finally {
    lock.release();
  }
}

async function runNpmCi() {
  rmSync(stamp, { force: true });
  const log = join(logFolder, "npm-ci.log");
  // no package of ours needs its install script, and none may run one
  const args = ["ci", "--include=dev", "--ignore-scripts", "--no-audit", "--no-fund"];
  const environment = { ...process.env };
  delete environment.NODE_ENV;
  const npm = process.env.npm_execpath;
  const [command, commandArgs] = npm?.endsWith(".js") ? [process.execPath, [npm, ...args]] : ["npm", args];
  const code = await run(command, commandArgs, { cwd: root, env: environment, log });
  if (code !== 0) throw new Refusal(`npm ci failed (whole log: ${log}):\n${tailOf(log)}`);
}
