// Finds PostgreSQL and Chromium on this machine; as root on a Debian-like system, installs what is missing.
import { execFileSync } from "node:child_process";
import { accessSync, constants, existsSync, mkdirSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { delimiter, join } from "node:path";
import { Refusal, say, step, tailOf } from "./messages.mjs";
import { logFolder } from "./paths.mjs";
import { run } from "./processes.mjs";

const OLDEST_POSTGRES = 14;
const onPath = () => (process.env.PATH ?? "").split(delimiter).filter(Boolean);
export const isRoot = () => process.getuid?.() === 0;

function ask(command, args) {
  try {
    return execFileSync(command, args, { encoding: "utf8", stdio: ["ignore", "pipe", "ignore"] }).trim();
  } catch {
    return null; // not there, or not able to say: the next candidate is looked at
  }
}

function debianFolders() {
  const base = "/usr/lib/postgresql";
  if (!existsSync(base)) return [];
  return readdirSync(base).sort((a, b) => Number(b) - Number(a)).map((version) => join(base, version, "bin"));
}

/** Every PostgreSQL server here that is new enough: { bin, major }, the preferred first. */
export function findPostgresServers() {
  const candidates = [process.env.PG_BIN, ask("pg_config", ["--bindir"]), ...debianFolders(), ...onPath()];
  const servers = [];
  for (const bin of new Set(candidates.filter(Boolean))) {
    if (!["initdb", "pg_ctl", "postgres"].every((name) => existsSync(join(bin, name)))) continue;
    const major = Number(/(\d+)(?:\.|devel|beta|rc|\s|$)/.exec(ask(join(bin, "postgres"), ["--version"]) ?? "")?.[1]);
    if (major >= OLDEST_POSTGRES) servers.push({ bin, major });
  }
  return servers;
}

export function findChromium() {
  const names = ["chromium", "chromium-browser", "google-chrome-stable", "google-chrome"];
  const candidates = [process.env.SLACKWATER_CHROMIUM, ...onPath().flatMap((folder) => names.map((name) => join(folder, name)))];
  return candidates.find((file) => file && isProgram(file)) ?? null;
}

function isProgram(file) {
  try {
    accessSync(file, constants.X_OK);
    return true;
  } catch {
    return false; // not there, or not a program
  }
}

/** Makes sure the programs are there. `wanted` holds "postgresql", "chromium" or both. */
export async function requirePrograms(wanted) {
  const missing = () =>
    wanted.filter((name) => (name === "postgresql" ? findPostgresServers().length === 0 : findChromium() === null));
  const before = missing();
  if (before.length === 0) return;
  if (!isRoot() || !existsSync("/usr/bin/apt-get")) throw new Refusal(instructions(before));
  await step(`install ${before.join(" and ")}`, () => installWithApt(before));
  const after = missing();
  if (after.length > 0) throw new Refusal(`apt-get ran, and ${after.join(" and ")} cannot be found.\n${instructions(after)}`);
}

async function installWithApt(names) {
  say(`Installing ${names.join(" and ")} with apt-get ...`);
  const log = join(logFolder, "apt.log");
  const apt = async (...args) => {
    const environment = { ...process.env, DEBIAN_FRONTEND: "noninteractive" };
    // cut off half way it would leave the machine's package database in need of repair
    const options = { log, append: true, env: environment, outlivesUs: true };
    const code = await run("apt-get", ["-o", "DPkg::Lock::Timeout=120", "-q", ...args], options);
    if (code !== 0) throw new Refusal(`apt-get ${args[0]} failed (whole log: ${log}):\n${tailOf(log)}\n\n${instructions(names)}`);
  };
  rmSync(log, { force: true });
  // Debian makes and starts a cluster on port 5432 with the package; Slackwater brings its own and leaves that port alone
  const noCluster = "/etc/postgresql-common/createcluster.d/slackwater.conf";
  if (names.includes("postgresql")) {
    mkdirSync("/etc/postgresql-common/createcluster.d", { recursive: true });
    writeFileSync(noCluster, "create_main_cluster = false\n");
  }
  try {
    await apt("update");
    await apt("install", "-y", "--no-install-recommends", ...names);
  } finally {
    rmSync(noCluster, { force: true });
  }
}

function instructions(names) {
  const lines = [`Missing on this machine: ${names.join(", ")}.`];
  lines.push(`On Debian or Ubuntu:  sudo apt-get update && sudo apt-get install ${names.join(" ")}`);
  if (names.includes("postgresql")) {
    lines.push(`Any PostgreSQL from version ${OLDEST_POSTGRES} on will do: set PG_BIN to the folder that holds initdb, pg_ctl and postgres.`);
    lines.push("Or set DATABASE_URL to a database on a server you have (see README.md).");
  }
  if (names.includes("chromium")) lines.push("Any Chromium or Chrome will do for the browser tests: set SLACKWATER_CHROMIUM to the program.");
  return lines.join("\n");
}
