import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine/index";
import { WARM_UP_DOCUMENT } from "@/lib/scenario/defaults";
import { templateById } from "@/lib/scenario/templates";
import { EngineTasks } from "@/workers/engine-tasks";

const pause = () => new Promise<void>((resolve) => setImmediate(resolve));
const reversal = templateById("reversal")!.document;

/** A clock that runs a slice's length ahead at every look, so that each stretch of work ends in a pause. */
function impatientClock(): () => number {
  let nowMs = 0;
  return () => (nowMs += 10);
}

describe("the engine's tasks", () => {
  test("a run gives the numbers of a plain simulation, to the bit", async () => {
    const outcome = await new EngineTasks(pause, impatientClock()).run({ document: reversal });
    expect(outcome.ok && outcome.value.simulation.figures).toEqual(simulate(reversal).figures);
  });

  test("a newer run supersedes one that is under way, and the newer one ends", async () => {
    const tasks = new EngineTasks(pause, impatientClock());
    const [older, newer] = await Promise.all([tasks.run({ document: reversal }), tasks.run({ document: reversal })]);
    expect(older).toEqual({ ok: false, failure: { code: "engine.superseded" } });
    expect(newer.ok).toBe(true);
  });

  test("a cancelled run says so and leaves the last one to be viewed", async () => {
    const tasks = new EngineTasks(pause, impatientClock());
    await tasks.run({ document: reversal });
    const running = tasks.run({ document: { ...reversal, run: { durationS: 0.05 } } });
    tasks.cancel();
    expect(await running).toEqual({ ok: false, failure: { code: "engine.cancelled" } });
    expect(tasks.view({ fromS: 0, toS: reversal.run.durationS, columnCount: 100 }).ok).toBe(true);
  });

  test("progress rises to the end and never falls", async () => {
    const shares: number[] = [];
    await new EngineTasks(pause, impatientClock()).run({ document: { ...reversal, run: { durationS: 0.03 } } }, ({ doneShare }) => shares.push(doneShare));
    expect(shares.length).toBeGreaterThan(3);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    expect(shares[shares.length - 1]).toBeLessThanOrEqual(1);
  });

  test("a document that is out of range is refused with its path, and there is no run to view", async () => {
    const tasks = new EngineTasks(pause, impatientClock());
    const outcome = await tasks.run({ document: { ...reversal, supply: { ...reversal.supply, voltageV: -5 } } });
    expect(!outcome.ok && outcome.failure.code === "input.invalid" && outcome.failure.findings.map((finding) => finding.path)).toEqual(["supply.voltageV"]);
    expect(tasks.view({ fromS: 0, toS: 1e-3, columnCount: 10 })).toEqual({ ok: false, failure: { code: "engine.no-run" } });
  });

  test("warming up gives way to a request and ends by itself", async () => {
    const tasks = new EngineTasks(pause, impatientClock(), WARM_UP_DOCUMENT);
    const warming = tasks.warmUp();
    expect((await tasks.run({ document: reversal })).ok).toBe(true);
    await warming;
    await tasks.warmUp();
  });
});
