/** JSON Schemas of what a simulation answers (lib/engine/results.ts); tests/integration/api.test.ts holds a real answer against them. */
type Schema = Record<string, unknown>;

const number = (description: string): Schema => ({ type: "number", description });
const numberOrNull = (description: string): Schema => ({ type: ["number", "null"], description });
const closed = (properties: Record<string, Schema>, optional: string[] = []): Schema => ({
  type: "object",
  properties,
  required: Object.keys(properties).filter((name) => !optional.includes(name)),
  additionalProperties: false,
});
const listOf = (items: Schema): Schema => ({ type: "array", items });
const named = (unit: string, names: string[], make: (description: string) => Schema): Record<string, Schema> =>
  Object.fromEntries(names.map((name) => [name, make(unit)]));

const legState: Schema = { enum: ["high channel", "low channel", "high diode", "low diode", "open"] };

const instant = closed({
  timeS: number("s"),
  dutyCommand: number("-1 to 1"),
  motorCurrentA: number("A, positive from terminal A to B"),
  speedRadPerS: number("rad/s"),
  ...named("V", ["busV", "terminalAV", "terminalBV", "senseAV"], number),
  ...named("A", ["topAA", "topBA", "bottomAA", "bottomBA", "supplyA", "bridgeA"], number),
  ...named(
    "V; null where the site or a missing reference has none",
    ["senseBV", "outAV", "outBV", "differenceV", "combinedV"],
    numberOrNull,
  ),
  state: closed({ A: legState, B: legState }),
});

const event = closed(
  { timeS: number("s"), kind: { type: "string" }, leg: { enum: ["A", "B"] }, detail: { type: "string" } },
  ["leg"],
);

const conversion = closed({
  timeS: number("s"),
  codeA: numberOrNull("LSB"),
  codeB: numberOrNull("LSB"),
  code: number("LSB"),
  reconstructedA: number("A"),
  trueA: number("A"),
  meanA: number("A, over the PWM period of the conversion"),
});

const figures = closed({
  ...named(
    "A",
    ["motorMeanA", "motorRmsA", "motorPeakA", "motorRippleA", "topARmsA", "topBRmsA", "supplyMeanA"],
    number,
  ),
  ...named("W", ["copperW", "switchesW", "mechanicalW", "inputW"], number),
  ...named("W; null where the site has none", ["shuntAW", "shuntBW"], numberOrNull),
  speedMeanRadPerS: number("rad/s"),
  torqueMeanNm: number("N m"),
  ...named(
    "V; null where there is no such output",
    ["outAMeanV", "outBMeanV", "differenceMeanV", "combinedMeanV", "headroomV"],
    numberOrNull,
  ),
  clippedShare: number("0 to 1"),
  ...named(
    "A; null without a conversion in the window",
    ["reconstructionErrorMeanA", "reconstructionErrorMaxA"],
    numberOrNull,
  ),
  busMaxV: number("V"),
  energyResidualShare: numberOrNull("share; null when a stall removes kinetic energy"),
  commutationRippleHz: numberOrNull("Hz"),
});

const notice = closed(
  {
    code: { type: "string" },
    severity: { enum: ["fault", "caution", "note"] },
    title: { type: "string" },
    text: { type: "string" },
    timeS: number("s"),
    path: { type: "string" },
  },
  ["timeS", "path"],
);

export const simulationSchema: Schema = closed({
  status: { enum: ["reached-end", "step-limit", "not-finite"] },
  statusText: { type: "string" },
  durationS: number("s"),
  window: closed({ fromS: number("s"), toS: number("s") }),
  at: listOf(instant),
  events: { ...listOf(event), description: "In order of time; the first 200 of each kind." },
  eventCounts: { type: "object", additionalProperties: { type: "integer" } },
  samples: { ...listOf(conversion), description: "Conversions inside the window, at most 8192." },
  figures,
  notices: listOf(notice),
  counters: closed(named("count", ["periods", "intervals", "crossings", "operatorBuilds"], number)),
});

export const problemSchema: Schema = {
  type: "object",
  description: "RFC 9457",
  properties: {
    type: { type: "string", format: "uri" },
    title: { type: "string" },
    status: { type: "integer" },
    detail: { type: "string" },
    code: { type: "string", description: "Stable; made of area and what." },
    errors: listOf(closed({ path: { type: "string" }, code: { type: "string" }, text: { type: "string" } })),
  },
  required: ["type", "title", "status", "code"],
};
