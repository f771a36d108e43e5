/** Compares a result with expected numbers within the `accept` rule of the reference cases; returns every miss in words. */
export type Accept = {
  at: Record<string, number>;
  figures: Record<string, number>;
  eventTimeS: number;
  samples: { code: number; reconstructedA: number; trueA: number; meanA: number };
};
type Row = Record<string, unknown>;
export type Expected = {
  at: Row[];
  window: number[];
  figures: Row;
  samples: Row[];
  accept: Accept;
  events: { timeS: number; kind: string }[];
  eventCounts: Record<string, number>;
  clipIntervals: number[][];
  clipCount?: number;
};
export type Actual = { at: object[]; figures: object; samples: object[]; window: { fromS: number; toS: number } };

const missNumber = (name: string, expected: unknown, actual: unknown, allowed: number): string[] => {
  if (expected === null || expected === undefined) return actual === null || actual === undefined ? [] : [`${name}: expected none, got ${String(actual)}`];
  if (typeof actual !== "number" || !(Math.abs(actual - Number(expected)) <= allowed))
    return [`${name}: expected ${String(expected)}, got ${String(actual)}, off by ${Number(actual) - Number(expected)}, allowed ${allowed}`];
  return [];
};

const compareAt = (expected: Row[], actual: Row[], accept: Accept): string[] =>
  expected.flatMap((row, n) => {
    const got = actual[n] ?? {};
    const name = `at[${n}] t=${String(row.timeS)}`;
    const numbers = Object.entries(accept.at).flatMap(([key, allowed]) => (key in row ? missNumber(`${name} ${key}`, row[key], got[key], allowed) : []));
    const same = row.state === undefined || JSON.stringify(row.state) === JSON.stringify(got.state);
    return same ? numbers : [...numbers, `${name} state: expected ${JSON.stringify(row.state)}, got ${JSON.stringify(got.state)}`];
  });

const compareSamples = (expected: Row[], actual: Row[], accept: Accept): string[] => {
  if (expected.length !== actual.length) return [`samples: expected ${expected.length}, got ${actual.length}`];
  return expected.flatMap((row, n) => {
    const got = actual[n] ?? {};
    const slack = row.ambiguousCode === true || accept.samples.code > 0 ? accept.samples.code : 0;
    const name = `samples[${n}]`;
    return [
      ...missNumber(`${name}.timeS`, row.timeS, got.timeS, 1e-12),
      ...["codeA", "codeB", "code"].flatMap((key) => missNumber(`${name}.${key}`, row[key], got[key], slack)),
      ...missNumber(`${name}.reconstructedA`, row.reconstructedA, got.reconstructedA, accept.samples.reconstructedA * 1.000001),
      ...missNumber(`${name}.trueA`, row.trueA, got.trueA, accept.samples.trueA),
      ...missNumber(`${name}.meanA`, row.meanA, got.meanA, accept.samples.meanA),
    ];
  });
};

export const compareResult = (expected: Expected, actual: Actual): string[] => {
  const figures = actual.figures as Row;
  return [
    ...missNumber("window.fromS", expected.window[0], actual.window.fromS, 1e-12),
    ...missNumber("window.toS", expected.window[1], actual.window.toS, 1e-12),
    ...compareAt(expected.at, actual.at as Row[], expected.accept),
    ...Object.entries(expected.accept.figures).flatMap(([key, allowed]) =>
      key in expected.figures ? missNumber(`figures.${key}`, expected.figures[key], figures[key], allowed) : [],
    ),
    ...compareSamples(expected.samples, actual.samples as Row[], expected.accept),
  ];
};

/** Times of the events of one kind against the expected ones, within `eventTimeS` or 1e-9 relative, whichever is larger. */
export const compareTimes = (name: string, expected: number[], actual: number[], eventTimeS: number): string[] => {
  if (expected.length > actual.length) return [`${name}: expected at least ${expected.length}, got ${actual.length}`];
  return expected.flatMap((timeS, n) => missNumber(`${name}[${n}]`, timeS, actual[n], Math.max(eventTimeS, 1e-9 * timeS)));
};
