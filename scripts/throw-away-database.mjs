// A PostgreSQL server for one test run: files in the system's temporary folder, any free port, gone afterwards.
import { chmodSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { databaseEnvironment, ensureDatabase, migrate, seed } from "./database.mjs";
import { logFolder, makeDataFolder } from "./paths.mjs";
import { findAnyPort } from "./ports.mjs";
import { startPostgres } from "./postgres.mjs";
import { isRunning } from "./processes.mjs";

const PREFIX = "slackwater-test-";
// a throw-away server on the loopback address holds nothing worth guarding; a password is still asked for, as in earnest
const secrets = { ownerPassword: "owner-of-a-test", applicationPassword: "application-of-a-test" };

/** Starts the server. Returns { server, makeDatabase(name, { withSeed }), stop }. */
export async function startThrowAwayDatabase() {
  makeDataFolder();
  await sweep();
  const folder = mkdtempSync(join(tmpdir(), PREFIX));
  chmodSync(folder, 0o711); // the user that runs the server must get through
  writeFileSync(join(folder, "run.pid"), String(process.pid));
  const server = await startPostgres({
    folder: join(folder, "postgres"),
    password: secrets.ownerPassword,
    log: join(logFolder, "postgres-test.log"),
    port: await findAnyPort(),
    isThrowAway: true,
  });

  async function makeDatabase(name, { withSeed = false } = {}) {
    await ensureDatabase(server, secrets, name);
    const urls = databaseEnvironment(server, secrets, name);
    await migrate(urls);
    if (withSeed) await seed(urls);
    return urls;
  }
  async function stop() {
    await server.stop();
    rmSync(folder, { recursive: true, force: true });
  }
  return { server, makeDatabase, stop };
}

/** Ends and removes what a killed test run left behind. */
async function sweep() {
  for (const name of readdirSync(tmpdir()).filter((entry) => entry.startsWith(PREFIX))) {
    const folder = join(tmpdir(), name);
    try {
      if (isRunning(Number(readFileSync(join(folder, "run.pid"), "utf8")))) continue;
      const left = Number(readFileSync(join(folder, "postgres/postmaster.pid"), "utf8").split("\n")[0]);
      if (isRunning(left, (pid) => commandOf(pid).includes(folder))) process.kill(left, "SIGQUIT");
    } catch (error) {
      if (error.code === "EACCES" || error.code === "EPERM") continue; // another user's run
      if (error.code !== "ENOENT") throw error;
    }
    rmSync(folder, { recursive: true, force: true });
  }
}

function commandOf(pid) {
  return process.platform === "linux" ? readFileSync(`/proc/${pid}/cmdline`, "utf8") : "";
}
