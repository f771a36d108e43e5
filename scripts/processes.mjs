// Children: each leads a process group of its own, so that Ctrl-C reaches only this process, which then ends them in order.
import { spawn } from "node:child_process";
import { closeSync, openSync, readFileSync, readlinkSync } from "node:fs";
import { setTimeout as wait } from "node:timers/promises";

const live = new Set();
let isClosed = false;

/**
 * Starts a program. `log` (a file) takes what it prints; without it the terminal does. `ended` settles with { code, signal }.
 * What `outlivesUs` is left alone when this process is stopped in a hurry.
 * @param {string} command
 * @param {string[]} args
 * @param {import("node:child_process").SpawnOptions & { log?: string, append?: boolean, outlivesUs?: boolean }} [options]
 * @returns {import("node:child_process").ChildProcess & { pid: number, ended: Promise<{ code: number | null, signal: string | null }> }}
 */
export function launch(command, args, { log, append = false, outlivesUs = false, ...options } = {}) {
  if (isClosed) throw new Error(`${command} is not started: we are stopping`);
  const output = log ? openSync(log, append ? "a" : "w", 0o600) : "inherit";
  const child = spawn(command, args, { stdio: ["ignore", output, output], detached: true, ...options });
  if (log) closeSync(output);
  if (!outlivesUs) live.add(child);
  child.ended = new Promise((settle, fail) => {
    child.on("error", (error) => {
      live.delete(child);
      fail(error);
    });
    child.on("exit", (code, signal) => {
      live.delete(child);
      settle({ code, signal });
    });
  });
  // whoever awaits `ended` still sees the failure; this only keeps an unwatched child from ending the script
  child.ended.catch(() => {});
  return child;
}

/** Runs a program to its end and returns its exit code (1 when a signal ended it). */
export async function run(command, args, options) {
  const { code } = await launch(command, args, options).ended;
  return code ?? 1;
}

function signalGroup(child, signal) {
  try {
    process.kill(-child.pid, signal);
  } catch (error) {
    if (error.code !== "ESRCH") throw error;
  }
}

/** Asks a child's whole group to end, and insists after `patienceMs`. */
export async function endGroup(child, patienceMs = 5_000) {
  if (child.pid === undefined || child.exitCode !== null || child.signalCode !== null) return;
  signalGroup(child, "SIGTERM");
  const ended = await Promise.race([child.ended, wait(patienceMs, null, { ref: false })]);
  if (!ended) {
    signalGroup(child, "SIGKILL");
    await child.ended;
  }
}

/** Ends what is still running, at once, and starts nothing more. For steps that can be done again: an installation, a build, a test run. */
export function killAll() {
  isClosed = true;
  for (const child of live) if (child.pid !== undefined) signalGroup(child, "SIGKILL");
}

/** Calls `stop` once on Ctrl-C, TERM, HUP, or when the npm that started us is gone. */
export function onStopRequest(stop) {
  let isStopping = false;
  const request = (reason) => {
    if (isStopping) return;
    isStopping = true;
    stop(reason);
  };
  for (const signal of ["SIGINT", "SIGTERM", "SIGHUP"]) process.on(signal, () => request(signal));
  if (!process.env.npm_lifecycle_event) return;
  const parent = process.ppid;
  setInterval(() => process.ppid !== parent && request("SIGHUP"), 1_000).unref();
}

/**
 * Tells whether process `pid` runs. A zombie (killed, not yet reaped) does not. With `belongs` the process must also be
 * the one meant: numbers are used again.
 */
export function isRunning(pid, belongs = () => true) {
  try {
    process.kill(pid, 0);
  } catch (error) {
    if (error.code !== "EPERM") return false;
  }
  if (process.platform !== "linux") return true;
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, "utf8");
    return stat.slice(stat.lastIndexOf(")") + 2)[0] !== "Z" && belongs(pid);
  } catch {
    return false; // gone between the two looks
  }
}

/** The folder a process works in, on Linux; null elsewhere or when we may not see it. */
export function workingFolder(pid) {
  try {
    return readlinkSync(`/proc/${pid}/cwd`);
  } catch {
    return null;
  }
}

/** Waits until `isTrue` holds; false when `timeoutMs` passed first. */
export async function until(isTrue, timeoutMs, everyMs = 50) {
  const end = performance.now() + timeoutMs;
  while (performance.now() < end) {
    if (await isTrue()) return true;
    await wait(everyMs);
  }
  return false;
}
