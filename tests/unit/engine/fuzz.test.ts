import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import { parseScenario } from "@/lib/scenario/schema";
import { arbitraryScenario } from "@/tests/support/oracle/arbitrary-scenario";

/** Two dozen periods must be over long before this, also with 64 conversions each; two cores may be shared. */
const LIMIT_MS = 4000;
const RUNS = 150;

/** Paths of all numbers of a result that are not finite. */
const notFinite = (value: unknown, path: string): string[] => {
  if (typeof value === "number") return Number.isFinite(value) ? [] : [`${path} = ${value}`];
  if (value === null || typeof value !== "object") return [];
  return Object.entries(value).flatMap(([key, inner]) => notFinite(inner, `${path}.${key}`));
};

describe.each([
  ["everyday numbers", 0],
  ["some numbers at the ends of their ranges", 1],
  ["most numbers anywhere in their ranges", 7],
] as const)("accepted documents with %s", (_words, weight) => {
  test("are accepted by the schema as drawn", () => {
    fc.assert(
      fc.property(arbitraryScenario({ weight }), (drawn) => {
        const parsed = parseScenario(drawn);
        expect(parsed.ok ? [] : parsed.findings).toEqual([]);
      }),
      { numRuns: RUNS, seed: 20261201 + weight },
    );
  });
  test("never hang, never throw and never give a number that is not finite", () => {
    fc.assert(
      fc.property(arbitraryScenario({ weight }), (drawn) => {
        const parsed = parseScenario(drawn);
        if (!parsed.ok) return;
        const { durationS } = parsed.document.run;
        const startMs = performance.now();
        const result = simulate(parsed.document, { at: [0, durationS / 3, durationS] });
        expect(performance.now() - startMs).toBeLessThan(LIMIT_MS);
        expect(notFinite(result, "result").slice(0, 5)).toEqual([]);
        // beyond what can be computed the result says so, and has no readings
        expect(result.at).toHaveLength(result.status === "reached-end" ? 3 : 0);
      }),
      { numRuns: RUNS, seed: 20261202 + weight },
    );
  }, 120_000);
});

describe("broken documents", () => {
  const poison = fc.constantFrom<unknown>(Number.NaN, Infinity, -Infinity, null, "12", -1e300, 1e300, [], {}, true, undefined);
  test("are refused with paths or run through, never anything else", () => {
    fc.assert(
      fc.property(arbitraryScenario({ weight: 0 }), fc.nat(), poison, (drawn, pick, bad) => {
        const leaves = leafPaths(drawn, []);
        const path = leaves[pick % leaves.length] ?? [];
        const parsed = parseScenario(withValue(drawn, path, bad));
        if (!parsed.ok) {
          expect(parsed.findings.length).toBeGreaterThan(0);
          for (const finding of parsed.findings) expect(finding.text.length).toBeGreaterThan(5);
          return;
        }
        expect(notFinite(simulate(parsed.document), "result")).toEqual([]);
      }),
      { numRuns: 300, seed: 20261203 },
    );
  }, 120_000);
  test("an unknown field anywhere is refused at its path", () => {
    fc.assert(
      fc.property(arbitraryScenario({ weight: 0 }), fc.constantFrom(["supply"], ["bridge", "lowSide"], ["pwm"], ["sensing", "amplifier"], ["run"], []), (drawn, where) => {
        const parsed = parseScenario(withValue(drawn, [...where, "surplus"], 1));
        expect(parsed.ok).toBe(false);
        if (!parsed.ok) expect(parsed.findings.map((finding) => finding.path).join(" ")).toContain([...where, "surplus"].join("."));
      }),
      { numRuns: 30, seed: 20261204 },
    );
  });
});

const leafPaths = (value: unknown, path: (string | number)[]): (string | number)[][] =>
  value !== null && typeof value === "object" ? Object.entries(value).flatMap(([key, inner]) => leafPaths(inner, [...path, key])) : [path];

const withValue = (document: unknown, path: (string | number)[], value: unknown): unknown => {
  const copy = structuredClone(document) as Record<string | number, unknown>;
  let holder = copy;
  for (const key of path.slice(0, -1)) holder = holder[key] as Record<string | number, unknown>;
  const last = path.at(-1);
  if (last !== undefined) holder[last] = value;
  return copy;
};
