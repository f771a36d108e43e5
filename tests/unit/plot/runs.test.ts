import { describe, expect, it } from "vitest";
import { bandAt, bandShares, mergeBands } from "@/components/plot/bands";
import { borderSegments, periodsPerSegment } from "@/components/plot/draw-axis";
import { onStretches } from "@/components/plot/draw-bands";
import { eventRows, mergeEvents, rowAt } from "@/components/plot/event-rows";
import { plotToSvg } from "@/components/plot/export";
import { availableLanes, defaultLaneIds } from "@/components/plot/lanes";
import { milestonesOf } from "@/components/plot/milestones";
import { knownSamples, nextSample, sampleNumberAt, sampleSchedule } from "@/components/plot/sample-schedule";
import { readSensing } from "@/components/plot/sensing-facts";
import { signRuns, splitByRuns } from "@/components/plot/sign-runs";
import { extentOf, spanFigures, valueAt } from "@/components/plot/values";
import { reversalDocument, runOf } from "./reversal";

const legTop = runOf(reversalDocument("legTop"));
const legBottom = runOf(reversalDocument("legBottom"));

describe("directions of the motor current", () => {
  const runs = signRuns(legTop.view);

  it("cover the view without gap, forward first and reverse after the zero crossing", () => {
    expect(runs[0]!.direction).toBe(1);
    expect(runs[runs.length - 1]!.direction).toBe(-1);
    expect(runs[0]!.fromS).toBe(0);
    expect(runs[runs.length - 1]!.toS).toBeCloseTo(6e-4, 12);
    expect(runs.every((run, index) => index === 0 || run.fromS === runs[index - 1]!.toS)).toBe(true);
  });

  it("change where the engine reports that the current is zero", () => {
    const zero = legTop.simulation.events.find((event) => event.kind === "currentZero");
    expect(runs[0]!.toS).toBeCloseTo(zero!.timeS, 8);
  });

  it("cut a waveform so that the pieces join and lose nothing", () => {
    const values = legTop.view.traces.motorCurrentA!.max;
    const all = Array.from(values.keys());
    const pieces = splitByRuns(legTop.view.timeS, values, all, runs);
    expect(pieces.map((piece) => piece.direction)).toEqual(runs.map((run) => run.direction));
    expect(pieces[0]!.values[pieces[0]!.values.length - 1]).toBeCloseTo(0, 9);
    expect(pieces.every((piece) => piece.values.every((value) => value * piece.direction >= -1e-9))).toBe(true);
    expect(pieces.reduce((sum, piece) => sum + piece.timeS.length, 0)).toBeGreaterThanOrEqual(values.length);
  });

  it("take the value before a jump for the piece that ends and the one after it for the piece that starts", () => {
    const pieces = splitByRuns([0, 1, 1, 2], [5, 6, -3, -4], [0, 1, 2, 3], [
      { fromS: 0, toS: 1, direction: 1 },
      { fromS: 1, toS: 2, direction: -1 },
    ]);
    expect(pieces.map((piece) => piece.values)).toEqual([
      [5, 6],
      [-3, -4],
    ]);
  });
});

describe("bands", () => {
  const { bands } = legTop.view;

  it("are found by time, the end of the last one included", () => {
    for (const band of bands.slice(0, 20)) expect(bandAt(bands, (band.fromS + band.toS) / 2)).toBe(band);
    expect(bandAt(bands, 6e-4)).toBe(bands[bands.length - 1]);
    expect(bandAt(bands, 7e-4)).toBeNull();
  });

  it("merge neighbours of one conduction and keep their whole extent", () => {
    const merged = mergeBands(bands);
    expect(merged.length).toBeLessThanOrEqual(bands.length);
    expect(merged.every((band, index) => index === 0 || band.conduction !== merged[index - 1]!.conduction)).toBe(true);
    expect(merged[merged.length - 1]!.toS).toBe(bands[bands.length - 1]!.toS);
  });

  it("add up to the whole as shares, with the drive at its duty", () => {
    const shares = bandShares(bands, 5e-5, 1e-4);
    expect(shares[shares.length - 1]!.to).toBeCloseTo(1, 9);
    const drive = shares.find((share) => share.conduction === "driveForward")!;
    expect(drive.to - drive.from).toBeGreaterThan(0.5);
    expect(drive.to - drive.from).toBeLessThan(0.56);
  });

  it("join the time a switch is on across bands", () => {
    const stretches = onStretches(bands, "lowB");
    expect(stretches[0]!.fromS).toBe(0);
    expect(stretches[0]!.toS).toBeGreaterThan(2e-4);
  });
});

describe("values at an instant", () => {
  it("agree with the engine's own reading", () => {
    for (const timeS of [1.7e-5, 1.01e-4, 2.25e-4, 4.3e-4]) {
      const reading = legTop.readAt(timeS);
      expect(valueAt(legTop.view, "motorCurrentA", timeS)).toBeCloseTo(reading.motorCurrentA, 2);
      expect(valueAt(legTop.view, "topAA", timeS)).toBeCloseTo(reading.topAA, 2);
    }
  });

  it("are none outside the view and for waveforms the site has not", () => {
    expect(valueAt(legTop.view, "motorCurrentA", 1)).toBeNull();
    expect(valueAt(runOf(reversalDocument("line")).view, "outBV", 1e-4)).toBeNull();
  });

  it("average a ramp and a jump exactly", () => {
    const view = { kind: "exact" as const, fromS: 0, toS: 2, timeS: Float64Array.of(0, 1, 1, 2), traces: { motorCurrentA: { min: Float64Array.of(0, 2, 5, 5), max: Float64Array.of(0, 2, 5, 5) } }, bands: [], samples: [], events: [] };
    const figures = spanFigures(view, "motorCurrentA", 0, 2)!;
    expect(figures.meanValue).toBeCloseTo((1 + 5) / 2, 12);
    expect(figures.rmsValue).toBeCloseTo(Math.sqrt((4 / 3 + 25) / 2), 12);
    expect(figures).toMatchObject({ min: 0, max: 5, change: 5, isEstimate: false });
    expect(spanFigures(view, "motorCurrentA", 0, 1)!.meanValue).toBeCloseTo(1, 12);
    expect(extentOf(view, "motorCurrentA", { fromS: 0.5, toS: 0.75 })).toEqual({ min: 1, max: 1.5 });
  });
});

describe("samples", () => {
  it("follow a schedule that hits every conversion of the engine", () => {
    for (const change of [{}, { perPeriod: 3, phase: 0.7 }, { perPeriod: 4, average: 3, phase: 0.1 }]) {
      const document = reversalDocument("legBottom");
      Object.assign(document.sensing.converter, change);
      const { simulation } = runOf(document);
      const schedule = sampleSchedule(document);
      expect(simulation.samples.length).toBeGreaterThan(3);
      simulation.samples.forEach((sample, index) => expect(sample.timeS).toBeCloseTo(schedule.firstS + index * schedule.spacingS, 12));
      expect(sampleNumberAt(schedule, simulation.samples[2]!.timeS, 1e-13)).toBe(3);
    }
  });

  it("end at the end of the run", () => {
    const schedule = { firstS: 1, spacingS: 2 };
    expect(nextSample(schedule, 3, 1, 1e-9, 5)).toBe(5);
    expect(nextSample(schedule, 5, 1, 1e-9, 6)).toBeNull();
    expect(nextSample(schedule, 1, -1, 1e-9, 6)).toBeNull();
    expect(nextSample(schedule, 2, -1, 1e-9, 6)).toBe(1);
  });

  it("of run and view are listed once", () => {
    const { samples } = legTop.view;
    expect(knownSamples(samples, samples, 1e-13)).toHaveLength(samples.length);
  });
});

describe("events", () => {
  const facts = readSensing(legBottom.document);
  const events = mergeEvents(legBottom.simulation.events, legBottom.view.events);
  const rows = eventRows(events, legBottom.view.samples, legBottom.view.bands, facts);

  it("of run and view appear once", () => {
    expect(events).toHaveLength(legBottom.view.events.length);
  });

  it("are one row an instant, in time order, in plain words", () => {
    expect(rows.every((row, index) => index === 0 || row.timeS > rows[index - 1]!.timeS)).toBe(true);
    const labels = rows.map((row) => row.label);
    expect(labels).toContain("BL off: dead time");
    expect(labels).toContain("BH on: return");
    expect(labels).toContain("AL on: recirculate");
    expect(labels).toContain("Command reverse");
  });

  it("number samples and say which miss the current", () => {
    const samples = rows.filter((row) => row.sample !== null);
    expect(samples.map((row) => row.sample!.number)).toEqual([1, 2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12]);
    expect(samples[0]!.sample!.isMiss).toBe(false);
    expect(samples[4]!.sample!.isMiss).toBe(true);
  });

  it("find the row in force at a time", () => {
    expect(rowAt(rows, rows[3]!.timeS, facts.instantS)).toBe(3);
    expect(rowAt(rows, (rows[3]!.timeS + rows[4]!.timeS) / 2, facts.instantS)).toBe(3);
    expect(rowAt(rows, -1, facts.instantS)).toBe(-1);
  });

  it("give milestones from start to end with the slack after the command", () => {
    const marks = milestonesOf(legBottom.simulation);
    expect(marks.map((mark) => mark.label)).toEqual(["Start", "Command", "Slack", "End"]);
    expect(marks[2]!.isSlack).toBe(true);
    expect(marks[2]!.timeS).toBeGreaterThan(2e-4);
  });
});

describe("lanes", () => {
  it("show two shunts for leg sites and one elsewhere", () => {
    expect(availableLanes(readSensing(legTop.document), legTop.view).map((lane) => lane.id)).toContain("shuntB");
    const line = runOf(reversalDocument("line"));
    const ids = availableLanes(readSensing(line.document), line.view).map((lane) => lane.id);
    expect(ids).toContain("shuntA");
    expect(ids).not.toContain("shuntB");
    expect(ids).not.toContain("difference");
  });

  it("are three on a phone", () => {
    expect(defaultLaneIds(readSensing(legTop.document), true)).toEqual(["conduction", "motor", "combined"]);
  });
});

describe("the graduated border", () => {
  it("counts periods in ones, twos, fives as they get narrow", () => {
    expect([50, 9, 8, 4, 1.7, 0.05].map(periodsPerSegment)).toEqual([1, 1, 2, 5, 10, 200]);
  });

  it("starts a segment with the number of its first period", () => {
    const facts = readSensing(legTop.document);
    const scene = { facts, scale: { fromS: 1.2e-4, toS: 3.1e-4, x0: 0, x1: 600 } } as Parameters<typeof borderSegments>[0];
    const segments = borderSegments(scene);
    expect(segments.map((segment) => segment.label)).toEqual(["3", "4", "5", "6", "7"]);
    expect(segments[0]!.fromS).toBe(1.2e-4);
    expect(segments[0]!.isInked).toBe(true);
  });
});

describe("what leaves the page", () => {
  it("is an SVG with its patterns inside, ids of its own and no reference outward", () => {
    const one = plotToSvg(legBottom.view, legBottom.document, { width: 900, height: 600 }, "light", { idPrefix: "one", title: "A <b> & \"c\"" });
    expect(one).toContain('<pattern id="one-reverseArea"');
    expect(one).toContain("url(#one-forwardArea)");
    expect(one).toContain("A &lt;b> &amp; \"c\"</title>");
    expect(one).not.toMatch(/NaN|undefined|href=|@font-face/);
    expect([...one.matchAll(/url\(#([^)]+)\)/g)].every((match) => one.includes(`id="${match[1]}"`))).toBe(true);
    const other = plotToSvg(legTop.view, legTop.document, { width: 900, height: 600 }, "dark");
    const ids = (svg: string) => [...svg.matchAll(/ id="([^"]+)"/g)].map((match) => match[1]);
    expect(ids(one).filter((id) => ids(other).includes(id))).toEqual([]);
  });

  it("has no text under 10.5 px", () => {
    const svg = plotToSvg(legTop.view, legTop.document, { width: 900, height: 600 }, "light");
    const sizes = [...svg.matchAll(/font-size="([\d.]+)"/g)].map((match) => Number(match[1]));
    expect(sizes.length).toBeGreaterThan(20);
    expect(Math.min(...sizes)).toBeGreaterThanOrEqual(10.5);
  });
});
