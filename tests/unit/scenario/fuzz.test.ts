import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { scenarioJsonSchema } from "@/lib/scenario/json-schema";
import { getAt } from "@/lib/scenario/paths";
import { parseScenario } from "@/lib/scenario/schema";
import { TEMPLATES } from "@/lib/scenario/templates";

/** Every path of a document, inner nodes too. */
function pathsOf(node: unknown, path = ""): string[] {
  if (typeof node !== "object" || node === null) return [path];
  return [
    path,
    ...Object.entries(node).flatMap(([key, child]) => pathsOf(child, path === "" ? key : `${path}.${key}`)),
  ].filter((one) => one !== "");
}

function put(root: unknown, path: string, value: unknown): void {
  const keys = path.split(".");
  const last = keys.pop()!;
  const parent = keys.length === 0 ? root : getAt(root, keys.join("."));
  if (typeof parent === "object" && parent !== null) (parent as Record<string, unknown>)[last] = value;
}

/** Made afresh each time, because the mutations below write into what they put. */
const fresh: ReadonlyArray<() => unknown> = [
  () => [],
  () => ({}),
  () => ({ kind: "motor" }),
  () => Object.create(null),
];

const odd = fc.oneof(
  fc.double(),
  fc.constantFrom<unknown>(
    NaN,
    Infinity,
    -Infinity,
    -0,
    0,
    1e308,
    5e-324,
    -1,
    null,
    undefined,
    "",
    "NaN",
    true,
    12n,
    Symbol("x"),
  ),
  fc.constantFrom(...fresh).map((make) => make()),
  fc.string(),
  fc.jsonValue({ maxDepth: 3 }),
  fc.array(fc.double(), { maxLength: 4 }),
);

/** A template with up to six fields replaced, removed or added. */
const mutated = fc
  .tuple(
    fc.constantFrom(...TEMPLATES),
    fc.array(fc.tuple(fc.nat(), odd, fc.constantFrom("replace", "remove", "add")), { minLength: 1, maxLength: 6 }),
  )
  .map(([template, mutations]) => {
    const document = structuredClone(template.document) as unknown as Record<string, unknown>;
    for (const [pick, value, way] of mutations) {
      const paths = pathsOf(document);
      if (paths.length === 0) continue;
      const path = paths[pick % paths.length];
      put(document, way === "add" ? `${path}.${String(pick % 7)}x` : path, way === "remove" ? undefined : value);
    }
    return document;
  });

/** The promise about a refusal: at least one finding, each with a text, no path twice. */
function expectSound(value: unknown): void {
  const parsed = parseScenario(value);
  if (parsed.ok) {
    // What is accepted is complete: parsing it again changes nothing, and nothing in it is no number
    expect(parseScenario(parsed.document)).toEqual(parsed);
    for (const path of pathsOf(parsed.document)) {
      const leaf = getAt(parsed.document, path);
      if (typeof leaf === "number") expect(Number.isFinite(leaf)).toBe(true);
    }
    return;
  }
  expect(parsed.findings.length).toBeGreaterThan(0);
  expect(new Set(parsed.findings.map((finding) => finding.path)).size).toBe(parsed.findings.length);
  for (const finding of parsed.findings) expect(finding.text.length).toBeGreaterThan(5);
}

describe("whatever is given as a document, it is read or refused, never thrown at", () => {
  test("valid documents with some fields broken", () => {
    fc.assert(fc.property(mutated, expectSound), { numRuns: 1500 });
  });
  test("any JSON", () => {
    fc.assert(fc.property(fc.jsonValue(), expectSound), { numRuns: 500 });
  });
  test("any value", () => {
    fc.assert(
      fc.property(
        fc.anything({ withBigInt: true, withDate: true, withMap: true, withNullPrototype: true, withTypedArray: true }),
        expectSound,
      ),
      { numRuns: 500 },
    );
  });
  test("a broken document is refused within a quarter of a second, with at most 500 findings", () => {
    const wide: Record<string, unknown> = { ...TEMPLATES[0].document };
    for (let index = 0; index < 4000; index += 1) wide[`field${index}`] = index;
    parseScenario(wide);
    const startMs = performance.now();
    const parsed = parseScenario(wide);
    expect(performance.now() - startMs).toBeLessThan(250);
    expect(parsed.ok ? 0 : parsed.findings.length).toBeLessThanOrEqual(500);
  });
});

describe("the JSON Schema", () => {
  type Node = {
    type?: string;
    properties?: Record<string, Node>;
    required?: string[];
    minimum?: number;
    maximum?: number;
    exclusiveMaximum?: number;
    additionalProperties?: unknown;
  };
  const schema = scenarioJsonSchema() as Node;

  test("says what is required, what may be left out and that nothing else may be there", () => {
    expect(schema.required?.sort()).toEqual([
      "bridge",
      "command",
      "format",
      "initial",
      "load",
      "notes",
      "pwm",
      "run",
      "sensing",
      "supply",
      "title",
    ]);
    expect(schema.additionalProperties).toBe(false);
    expect(schema.properties?.supply.required).toEqual(["voltageV"]);
  });
  test("gives the ranges", () => {
    expect(schema.properties?.supply.properties?.voltageV).toMatchObject({
      type: "number",
      minimum: 0.1,
      maximum: 2000,
    });
    expect(schema.properties?.sensing.properties?.converter.properties?.phase).toMatchObject({
      minimum: 0,
      exclusiveMaximum: 1,
    });
    expect(schema.properties?.sensing.properties?.converter.properties?.bits).toMatchObject({
      type: "integer",
      minimum: 6,
      maximum: 24,
    });
  });
  test("is plain JSON", () => {
    expect(JSON.parse(JSON.stringify(schema))).toEqual(schema);
  });
});
