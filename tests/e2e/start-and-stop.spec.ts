import { spawn } from "node:child_process";
import { chmodSync, existsSync, mkdtempSync, readFileSync, readdirSync, readlinkSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join, resolve } from "node:path";
import { expect, test } from "@playwright/test";
import { isPortFree, findAnyPort } from "../../scripts/ports.mjs";
import { isRunning, until } from "../../scripts/processes.mjs";

const root = resolve(import.meta.dirname, "../..");
const quick = { timeout: 60_000, intervals: [200] };

/** `npm start` without npm: the supervisor with a data folder and a port of its own. */
function startSlackwater(dataFolder: string, port: number) {
  const { DATABASE_URL: _url, DATABASE_OWNER_URL: _owner, npm_lifecycle_event: _npm, ...rest } = process.env;
  const environment = { ...rest, SLACKWATER_DATA_DIR: dataFolder, PORT: String(port), SLACKWATER_DEMO: "0", SLACKWATER_TEST_RUN: "1" };
  const child = spawn(process.execPath, ["scripts/start.mjs"], { cwd: root, env: environment, detached: true });
  let printed = "";
  child.stdout.on("data", (data) => (printed += data));
  child.stderr.on("data", (data) => (printed += data));
  const ended = new Promise<number | null>((settle) => child.on("exit", (code) => settle(code)));
  return { pid: child.pid!, ended, printed: () => printed, signal: (name: NodeJS.Signals) => child.kill(name) };
}

/** The children of a process, by name. */
function childrenOf(pid: number): Map<string, number> {
  const found = new Map<string, number>();
  for (const entry of readdirSync("/proc").filter((name) => /^\d+$/.test(name))) {
    try {
      const stat = readFileSync(`/proc/${entry}/stat`, "utf8");
      if (Number(stat.slice(stat.lastIndexOf(")") + 2).split(" ")[1]) === pid) found.set(stat.slice(stat.indexOf("(") + 1, stat.lastIndexOf(")")), Number(entry));
    } catch {
      // ended between the two looks
    }
  }
  return found;
}

/** Every process that works in the data folder: the server and what it started. */
const databaseProcesses = (folder: string) =>
  readdirSync("/proc").filter((entry) => {
    try {
      return /^\d+$/.test(entry) && readlinkSync(`/proc/${entry}/cwd`).startsWith(folder);
    } catch {
      return false; // ended between the two looks
    }
  });

test.describe("starting and stopping", () => {
  test.skip(process.platform !== "linux", "looks into /proc");
  test.describe.configure({ timeout: 180_000 });
  let base: string;
  let data: string;
  let port: number;
  const isHealthy = async () => (await fetch(`http://localhost:${port}/api/health`).catch(() => null))?.status === 200;
  const childNamed = (pid: number, name: RegExp) => [...childrenOf(pid)].find(([command]) => name.test(command))?.[1];

  test.beforeEach(async () => {
    base = mkdtempSync(join(tmpdir(), "start-and-stop-"));
    chmodSync(base, 0o711);
    data = join(base, "data");
    port = Number(await findAnyPort());
  });
  test.afterEach(() => rmSync(base, { recursive: true, force: true }));

  test("one start serves, a second names the first, a killed server or database comes back, Ctrl-C leaves nothing", async () => {
    const first = startSlackwater(data, port);
    await expect.poll(first.printed, quick).toContain(`Slackwater is ready at http://localhost:${port}`);
    expect(await isHealthy()).toBe(true);

    const second = startSlackwater(data, port);
    expect(await second.ended).toBe(0);
    expect(second.printed()).toContain(`already running at http://localhost:${port}`);

    process.kill(childNamed(first.pid, /^next-server/)!, "SIGKILL");
    await expect.poll(first.printed, quick).toContain("The web server runs again.");
    expect(await isHealthy()).toBe(true);

    process.kill(childNamed(first.pid, /^postgres$/)!, "SIGKILL");
    await expect.poll(first.printed, quick).toContain("The database server runs again.");
    await expect.poll(isHealthy, quick).toBe(true);

    first.signal("SIGINT");
    expect(await first.ended).toBe(0);
    expect(await isPortFree(port)).toBe(true);
    expect(databaseProcesses(data)).toEqual([]);
    expect(existsSync(join(data, "postgres/postmaster.pid"))).toBe(false);
    expect(existsSync(join(data, "start.lock"))).toBe(false);
  });

  test("after the supervisor was killed outright the next start takes over and the data is there", async () => {
    const first = startSlackwater(data, port);
    await expect.poll(first.printed, quick).toContain("is ready");
    const web = childNamed(first.pid, /^next-server/)!;
    const database = childNamed(first.pid, /^postgres$/)!;
    process.kill(first.pid, "SIGKILL");
    expect(await until(() => !isRunning(web), 10_000)).toBe(true);
    expect(isRunning(database)).toBe(true);

    const next = startSlackwater(data, port);
    await expect.poll(next.printed, quick).toContain("is ready");
    expect(Number(readFileSync(join(data, "postgres/postmaster.pid"), "utf8").split("\n")[0])).toBe(database);
    next.signal("SIGTERM");
    expect(await next.ended).toBe(0);
    expect(databaseProcesses(data)).toEqual([]);
  });

  test("stopped while it is still starting, it leaves nothing behind", async () => {
    for (const afterMs of [100, 400, 900]) {
      const started = startSlackwater(data, port);
      await expect.poll(() => existsSync(join(data, "start.lock")), quick).toBe(true);
      await new Promise((settle) => setTimeout(settle, afterMs));
      started.signal("SIGTERM");
      await started.ended;
      expect(databaseProcesses(data), `after ${afterMs} ms`).toEqual([]);
    }
  });
});
