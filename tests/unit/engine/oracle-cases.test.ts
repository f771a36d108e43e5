import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import { parseScenario } from "@/lib/scenario/schema";
import { compareResult, compareTimes, type Expected } from "@/tests/support/oracle/compare";
import { clipIntervalsOf, timesOf } from "@/tests/support/oracle/engine-events";

/** Documents and expected numbers of tests/reference/oracle-cases, made by tests/support/oracle/generate.ts. */
type Stored = { name: string; covers: string; document: unknown; expected: Expected };
const folder = join(import.meta.dirname, "../../reference/oracle-cases");
const stored = readdirSync(folder).map((name) => JSON.parse(readFileSync(join(folder, name), "utf8")) as Stored);
const SHOWN_COUNT = 12;

test("the reference covers at least thirty situations", () => {
  expect(stored.length).toBeGreaterThanOrEqual(30);
});

describe.each(stored)("$name: $covers", ({ document: raw, expected }) => {
  const parsed = parseScenario(raw);
  test("the document is accepted", () => {
    expect(parsed.ok ? [] : parsed.findings).toEqual([]);
  });
  if (!parsed.ok) return;
  const { document } = parsed;
  const result = simulate(document, { at: expected.at.map((row) => Number(row.timeS)) });

  test("instants, figures and samples agree with the reference", () => {
    expect(result.status).toBe("reached-end");
    expect(compareResult(expected, result).slice(0, SHOWN_COUNT)).toEqual([]);
  });
  test("events are located where the reference has them", () => {
    // A resistive load jumps through zero at edges and an opened winding drops the current: no crossing is located there.
    const jumps = document.load.kind === "resistive" || document.faults.some((fault) => fault.kind === "openWinding");
    for (const kind of jumps ? ["diodeEnds", "shaftSticks", "breakAway"] : ["diodeEnds", "currentZero", "shaftSticks", "breakAway"]) {
      const wanted = expected.events.filter((event) => event.kind === kind).map((event) => event.timeS);
      expect(compareTimes(kind, wanted, timesOf(result, kind), expected.accept.eventTimeS).slice(0, SHOWN_COUNT)).toEqual([]);
    }
    if (document.sensing.amplifier.arrangement === "combinedMidscale" || document.sensing.site === "line") {
      const found = clipIntervalsOf(result);
      for (const side of [0, 1] as const)
        expect(compareTimes(`clip ${side}`, expected.clipIntervals.map((one) => one[side] ?? 0), found.map((one) => one[side]), expected.accept.eventTimeS).slice(0, SHOWN_COUNT)).toEqual([]);
    }
  });
  test("the energy adds up", () => {
    const share = result.figures.energyResidualShare;
    if (share !== null) expect(share).toBeLessThan(1e-6);
  });
});
