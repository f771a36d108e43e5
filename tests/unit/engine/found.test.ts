import { execFileSync } from "node:child_process";
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { simulateReference } from "@/tests/support/oracle/simulate";

/** Documents that once broke the engine (tests/reference/found); each keeps its test for good. */
const root = join(import.meta.dirname, "../../..");
const folder = join(root, "tests/reference/found");
const LIMIT_MS = 20_000;
/** 8000 turns of the motor's own oscillation in one PWM period: finite and in time, but the run carries the notice `energyResidual`. */
const BALANCE: Record<string, number> = { "state-not-finite.json": 1e-2 };

describe.each(readdirSync(folder))("%s", (name) => {
  test("ends in time, with finite numbers and a closed energy balance", () => {
    const script = join(root, "tests/support/oracle/run-one.ts");
    const printed = execFileSync(process.execPath, ["--import", "tsx", script, join(folder, name)], { cwd: root, timeout: LIMIT_MS, encoding: "utf8" });
    const found = JSON.parse(printed) as { status: string; isFinite: boolean; energyResidualShare: number | null; milliseconds: number };
    expect(found.isFinite).toBe(true);
    // A document may be beyond what can be computed; then the result says so and has no balance to show.
    if (found.status === "reached-end" && found.energyResidualShare !== null) expect(found.energyResidualShare).toBeLessThan(BALANCE[name] ?? 1e-6);
    expect(found.milliseconds).toBeLessThan(4000);
  }, 30_000);
});

describe.each(["diode-end-missed.json", "fan-secant-too-coarse.json"])("%s against the reference", (name) => {
  test("current and speed agree within a millionth of full scale", () => {
    const document = JSON.parse(readFileSync(join(folder, name), "utf8")) as ScenarioDocument;
    const at = Array.from({ length: 40 }, (_, n) => (document.run.durationS * (n + 0.37)) / 40);
    const reference = simulateReference(document, { at });
    const { currentA, speedRadPerS } = reference.fullScale;
    simulate(document, { at }).at.forEach((row, n) => {
      expect(Math.abs(row.motorCurrentA - (reference.at[n]?.motorCurrentA ?? Number.NaN))).toBeLessThan(1e-6 * currentA);
      expect(Math.abs(row.speedRadPerS - (reference.at[n]?.speedRadPerS ?? Number.NaN))).toBeLessThan(1e-6 * Math.max(speedRadPerS, 1e-3));
    });
  }, 60_000);
});
