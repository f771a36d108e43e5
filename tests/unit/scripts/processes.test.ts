import { spawn } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join } from "node:path";
import { describe, expect, it } from "vitest";
import { endGroup, isRunning, launch, until } from "../../../scripts/processes.mjs";

const pidOf = (text: string) => Number(/\d+/.exec(text)?.[0]);

describe("processes", () => {
  it("ending a group ends the children of the child too", async () => {
    const note = join(mkdtempSync(join(tmpdir(), "processes-")), "grandchild");
    const parent = launch("sh", ["-c", 'sleep 60 & echo $! > "$NOTE"; wait'], { env: { ...process.env, NOTE: note } });
    expect(await until(() => existsSync(note) && readFileSync(note, "utf8") !== "", 10_000)).toBe(true);
    const grandchild = pidOf(readFileSync(note, "utf8"));
    rmSync(dirname(note), { recursive: true });
    expect(isRunning(grandchild)).toBe(true);
    await endGroup(parent);
    expect(await until(() => !isRunning(grandchild), 5_000)).toBe(true);
    expect(isRunning(parent.pid)).toBe(false);
  });

  it("a child that ignores TERM is killed after the patience given", async () => {
    const child = launch("sh", ["-c", 'trap "" TERM; while :; do sleep 0.05; done']);
    await until(() => isRunning(child.pid), 2_000);
    await new Promise((settle) => setTimeout(settle, 200));
    await endGroup(child, 300);
    expect(await child.ended).toEqual({ code: null, signal: "SIGKILL" });
  });

  it.runIf(process.platform === "linux")("a zombie does not count as running", async () => {
    // the shell's child ends at once and is never waited for: exec replaced the shell that would have reaped it
    const parent = spawn("sh", ["-c", "true & echo $!; exec sleep 60"], { stdio: ["ignore", "pipe", "ignore"] });
    const text = await new Promise<string>((settle) => parent.stdout.once("data", (data) => settle(String(data))));
    const zombie = pidOf(text);
    expect(await until(() => !isRunning(zombie), 5_000)).toBe(true);
    // a system that reaps it on the parent's behalf leaves nothing to be taken for running: the promise holds all the more
    if (existsSync(`/proc/${zombie}`)) expect(() => process.kill(zombie, 0)).not.toThrow();
    parent.kill("SIGKILL");
  });
});
