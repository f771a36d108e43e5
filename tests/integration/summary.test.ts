import { describe, expect, it } from "vitest";
import { createRun, simulate } from "@/lib/engine/index";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { summarise } from "@/lib/server/summary";
import { shortDocument } from "./support/world";

const lasting = (durationS: number): ScenarioDocument => ({ ...shortDocument(), run: { durationS } });

describe("the summary of a revision", () => {
  it("holds the engine's figures to six digits", async () => {
    const document = lasting(3e-3);
    const { figures } = simulate(document);
    const summary = await summarise(document);
    for (const name of ["motorRmsA", "motorRippleA", "headroomV", "reconstructionErrorMaxA"] as const) {
      const expected = figures[name] as number;
      expect(Math.abs((summary![name] as number) - expected), name).toBeLessThanOrEqual(5e-6 * Math.abs(expected));
    }
    expect(summary!.clippedShare).toBe(figures.clippedShare);
  });

  // one short enough for break points, one wide enough for columns of the engine (400 periods is its border)
  it.each([1e-3, 5e-2])("draws 64 columns that bound the current at any instant, over %f s", async (durationS) => {
    const document = lasting(durationS);
    const { spark, scaleA } = (await summarise(document))!;
    expect([spark.fromS, spark.toS, spark.minA.length, spark.maxA.length]).toEqual([0, durationS, 64, 64]);
    const run = createRun(document);
    while (!run.advance(1000)) continue;
    run.finish();
    const times = Array.from({ length: 641 }, (_, k) => (k / 641) * durationS);
    // six digits kept; between break points the current is drawn straight, bent by at most (dt/tau)^2/8 of its change
    const slackA = 2e-3 * scaleA;
    for (const { timeS, motorCurrentA } of run.readAt(times)) {
      const column = Math.min(63, Math.floor((timeS / durationS) * 64));
      expect(motorCurrentA).toBeGreaterThanOrEqual(spark.minA[column]! - slackA);
      expect(motorCurrentA).toBeLessThanOrEqual(spark.maxA[column]! + slackA);
    }
    expect(scaleA).toBe(Math.max(...spark.maxA.map(Math.abs), ...spark.minA.map(Math.abs)));
  });

  it("is left out beyond 40 000 periods, without running them", async () => {
    const started = performance.now();
    expect(await summarise(lasting(60))).toBeNull();
    expect(performance.now() - started).toBeLessThan(50);
  });
});
