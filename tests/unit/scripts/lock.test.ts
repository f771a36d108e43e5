import { mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, describe, expect, it } from "vitest";
import { readHolder, takeLock } from "../../../scripts/lock.mjs";

describe("lock", () => {
  let folder: string;
  let file: string;
  beforeEach(() => {
    folder = mkdtempSync(join(tmpdir(), "lock-"));
    file = join(folder, "start.lock");
  });
  afterEach(() => rmSync(folder, { recursive: true }));

  it("the second to ask is told who holds it and what the holder noted", () => {
    takeLock(file).note?.({ url: "http://localhost:3007" });
    expect(takeLock(file).holder).toMatchObject({ pid: process.pid, url: "http://localhost:3007" });
  });

  it("is free again once released", () => {
    takeLock(file).release?.();
    expect(readHolder(file)).toBeNull();
    expect(takeLock(file).holder).toBeUndefined();
  });

  it("a holder that is gone holds nothing", () => {
    // above the largest number a process can have on Linux (2^22)
    writeFileSync(file, JSON.stringify({ pid: 4_194_305, beganAt: "1" }));
    expect(takeLock(file).holder).toBeUndefined();
    expect(JSON.parse(readFileSync(file, "utf8")).pid).toBe(process.pid);
  });

  it.runIf(process.platform === "linux")("a process that got the number of a dead holder is not taken for it", () => {
    writeFileSync(file, JSON.stringify({ pid: process.pid, beganAt: "17" }));
    expect(readHolder(file)).toBeNull();
  });

  it("a lock cut off while it was written counts as free", () => {
    writeFileSync(file, '{"pid": 12');
    expect(takeLock(file).holder).toBeUndefined();
  });
});
