import { describe, expect, it } from "vitest";
import { applyCommand, commandOfKey, type RunPlace } from "@/components/plot/run-commands";
import { fitWindow, panWindow, revealTime, timeOf, xOf, zoomWindow } from "@/components/plot/scale";
import { stepFrom, type StepStops } from "@/components/plot/steps";
import { pinchWindow, snapTo } from "@/components/plot/use-plot-pointer";

const durationS = 6e-4;
const periodS = 5e-5;
const stops: StepStops = {
  events: [0, 1.25e-5, 3.75e-5, 2.1625e-4, 2.1725e-4, 5.9e-4],
  milestones: [0, 2e-4, 3.284e-4, 6e-4],
  samples: { firstS: 2.5e-5, spacingS: 5e-5 },
  periodS,
  instantS: periodS * 1e-9,
  durationS,
};
const stroke = (key: string, more: Partial<Parameters<typeof commandOfKey>[0]> = {}) => ({ key, shiftKey: false, ctrlKey: false, altKey: false, metaKey: false, ...more });
const place = (cursorS: number): RunPlace => ({ cursorS, window: { fromS: 0, toS: durationS }, pinS: null });

describe("the window", () => {
  it("keeps the time under the pointer when it is zoomed", () => {
    const scale = { fromS: 1e-4, toS: 3e-4, x0: 120, x1: 720 };
    const aboutS = timeOf(scale, 333);
    const next = zoomWindow(scale, 0.4, aboutS, durationS, periodS);
    expect(xOf({ ...next, x0: 120, x1: 720 }, aboutS)).toBeCloseTo(333, 6);
  });

  it("never leaves the run and never grows past it", () => {
    expect(fitWindow({ fromS: -1, toS: 1 }, durationS, periodS)).toEqual({ fromS: 0, toS: durationS });
    expect(panWindow({ fromS: 4e-4, toS: 5e-4 }, 1, durationS)).toEqual({ fromS: expect.closeTo(5e-4, 12) as number, toS: durationS });
    expect(zoomWindow({ fromS: 0, toS: durationS }, 8, 1e-4, durationS, periodS)).toEqual({ fromS: 0, toS: durationS });
  });

  it("stops zooming in at a thousandth of a period", () => {
    let window = { fromS: 0, toS: durationS };
    for (let index = 0; index < 60; index += 1) window = zoomWindow(window, 0.5, 3e-4, durationS, periodS);
    expect(window.toS - window.fromS).toBeCloseTo(periodS / 1000, 12);
  });

  it("moves only as far as the cursor needs", () => {
    const window = { fromS: 1e-4, toS: 2e-4 };
    expect(revealTime(window, 1.5e-4, durationS)).toBe(window);
    const moved = revealTime(window, 2.5e-4, durationS);
    expect(moved.toS).toBeGreaterThan(2.5e-4);
    expect(moved.fromS).toBeLessThan(2.5e-4);
  });

  it("puts two instants under two fingers", () => {
    const scale = { fromS: 0, toS: durationS, x0: 100, x1: 700 };
    const pinched = pinchWindow(scale, timeOf(scale, 300), timeOf(scale, 400), 200, 500);
    const next = { ...pinched, x0: 100, x1: 700 };
    expect(xOf(next, timeOf(scale, 300))).toBeCloseTo(200, 6);
    expect(xOf(next, timeOf(scale, 400))).toBeCloseTo(500, 6);
  });

  it("snaps a click to the nearest stop within reach only", () => {
    expect(snapTo([1, 2, 3], 2.04, 0.1)).toBe(2);
    expect(snapTo([1, 2, 3], 2.4, 0.1)).toBe(2.4);
  });
});

describe("steps", () => {
  it("go to the neighbouring event, sample and milestone in both directions", () => {
    expect(stepFrom(1.25e-5, "event", 1, stops)).toBe(3.75e-5);
    expect(stepFrom(1.25e-5, "event", -1, stops)).toBe(0);
    expect(stepFrom(2.1e-4, "sample", 1, stops)).toBeCloseTo(2.25e-4, 12);
    expect(stepFrom(2.25e-4, "sample", 1, stops)).toBeCloseTo(2.75e-4, 12);
    expect(stepFrom(2.25e-4, "sample", -1, stops)).toBeCloseTo(1.75e-4, 12);
    expect(stepFrom(2.5e-4, "milestone", -1, stops)).toBe(2e-4);
  });

  it("stay where they are at the ends", () => {
    expect(stepFrom(5.9e-4, "event", 1, stops)).toBe(5.9e-4);
    expect(stepFrom(5.75e-4, "sample", 1, stops)).toBeCloseTo(5.75e-4, 12);
    expect(stepFrom(2.5e-5, "sample", -1, stops)).toBe(2.5e-5);
    expect(stepFrom(5.9e-4, "period", 1, stops)).toBe(durationS);
  });

  it("by period keep the place within the period", () => {
    expect(stepFrom(1.1e-4, "period", 1, stops)).toBeCloseTo(1.6e-4, 12);
  });
});

describe("keys", () => {
  it("mean what the key map says", () => {
    expect(commandOfKey(stroke("ArrowRight"), true)).toEqual({ do: "step", kind: "event", direction: 1 });
    expect(commandOfKey(stroke("ArrowLeft", { shiftKey: true }), true)).toEqual({ do: "step", kind: "period", direction: -1 });
    expect(commandOfKey(stroke("ArrowLeft", { ctrlKey: true }), true)).toEqual({ do: "pan", direction: -1 });
    expect(commandOfKey(stroke("]"), true)).toEqual({ do: "step", kind: "milestone", direction: 1 });
    expect(commandOfKey(stroke(","), true)).toEqual({ do: "step", kind: "sample", direction: -1 });
    expect(commandOfKey(stroke("p"), true)).toEqual({ do: "pin" });
    expect(commandOfKey(stroke("P", { shiftKey: true }), true)).toEqual({ do: "unpin" });
    expect(commandOfKey(stroke("z"), true)).toEqual({ do: "period" });
    expect(commandOfKey(stroke("0"), true)).toEqual({ do: "whole" });
    expect(commandOfKey(stroke("End"), true)).toEqual({ do: "goTo", place: "end" });
  });

  it("of one character are silent when switched off, arrows are not", () => {
    for (const key of ["[", "]", ",", ".", "p", "z", "+", "-", "0"]) expect(commandOfKey(stroke(key), false)).toBeNull();
    expect(commandOfKey(stroke("ArrowRight"), false)).not.toBeNull();
  });

  it("leave combinations of the browser alone", () => {
    expect(commandOfKey(stroke("p", { ctrlKey: true }), true)).toBeNull();
    expect(commandOfKey(stroke("ArrowLeft", { altKey: true }), true)).toBeNull();
  });
});

describe("commands", () => {
  it("bring the cursor into the window", () => {
    const from: RunPlace = { cursorS: 3.75e-5, window: { fromS: 0, toS: 5e-5 }, pinS: null };
    const next = applyCommand(from, { do: "step", kind: "event", direction: 1 }, stops);
    expect(next.cursorS).toBe(2.1625e-4);
    expect(next.window.toS - next.window.fromS).toBeCloseTo(5e-5, 12);
    expect(next.cursorS).toBeLessThan(next.window.toS);
  });

  it("zoom to the period of the cursor, to the span and back to the whole run", () => {
    const period = applyCommand(place(2.25e-4), { do: "period" }, stops).window;
    expect(period.fromS).toBeCloseTo(1.95e-4, 12);
    expect(period.toS).toBeCloseTo(2.55e-4, 12);
    const span = applyCommand({ ...place(3e-4), pinS: 1e-4 }, { do: "span" }, stops).window;
    expect(span.fromS).toBeCloseTo(9e-5, 12);
    expect(span.toS).toBeCloseTo(3.1e-4, 12);
    expect(applyCommand({ ...place(3e-4), window: span }, { do: "whole" }, stops).window).toEqual({ fromS: 0, toS: durationS });
  });

  it("set and remove the pin without moving anything else", () => {
    const pinned = applyCommand(place(2.25e-4), { do: "pin" }, stops);
    expect(pinned).toEqual({ ...place(2.25e-4), pinS: 2.25e-4 });
    expect(applyCommand(pinned, { do: "unpin" }, stops).pinS).toBeNull();
  });
});
