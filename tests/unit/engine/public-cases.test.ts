import { existsSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import { parseScenario } from "@/lib/scenario/schema";
import { compareResult, compareTimes, type Expected } from "@/tests/support/oracle/compare";
import { clipIntervalsOf, timesOf } from "@/tests/support/oracle/engine-events";

/** The six public cases: expected numbers come from a reference made outside this project (tests/reference/cases). */
const folder = join(import.meta.dirname, "../../reference/cases");
const names = readdirSync(folder).filter((name) => name.endsWith(".expected.json"));
const read = (name: string): unknown => JSON.parse(readFileSync(join(folder, name), "utf8"));

test("all six public cases are here", () => {
  expect(names).toHaveLength(6);
  for (const name of names) expect(existsSync(join(folder, name.replace(".expected", "")))).toBe(true);
});

describe.each(names)("%s", (name) => {
  const expected = read(name) as Expected;
  const parsed = parseScenario(read(name.replace(".expected", "")));
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.findings));
  const result = simulate(parsed.document, { at: expected.at.map((row) => Number(row.timeS)) });

  test("reaches the end with instants, figures and samples inside the accepted distance", () => {
    expect(result.status).toBe("reached-end");
    expect(compareResult(expected, result)).toEqual([]);
  });
  test("locates every event of the reference", () => {
    for (const kind of ["diodeEnds", "currentZero", "shaftSticks", "breakAway"]) {
      const wanted = expected.events.filter((event) => event.kind === kind).map((event) => event.timeS);
      expect(compareTimes(kind, wanted, timesOf(result, kind), expected.accept.eventTimeS)).toEqual([]);
      if (expected.eventCounts[kind] !== undefined) expect([kind, result.eventCounts[kind as "diodeEnds"]]).toEqual([kind, expected.eventCounts[kind]]);
    }
  });
  test("clips from and to the same instants", () => {
    const found = clipIntervalsOf(result);
    for (const side of [0, 1] as const)
      expect(compareTimes(`clip ${side}`, expected.clipIntervals.map((one) => one[side] ?? 0), found.map((one) => one[side]), expected.accept.eventTimeS)).toEqual([]);
    expect(result.eventCounts.clipStarts ?? 0).toBe(expected.clipCount ?? 0);
  });
});
