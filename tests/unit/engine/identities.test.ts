import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { simulate } from "@/lib/engine";
import type { InstantReading } from "@/lib/engine/results";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { arbitraryScenario } from "@/tests/support/oracle/arbitrary-scenario";

/** Identities of model.md section 1 and of time itself, on drawn documents of everyday size. */
const HEALTHY = arbitraryScenario({ weight: 0 }, { withFaults: false });
const ANY = arbitraryScenario({ weight: 0 });
const settings = (seed: number, numRuns = 60) => ({ seed, numRuns });
const instants = (document: ScenarioDocument, count: number): number[] => Array.from({ length: count }, (_, n) => (document.run.durationS * (n + 0.37)) / count);
const sizeOf = (rows: InstantReading[]): number => Math.max(1e-9, ...rows.flatMap((row) => [row.motorCurrentA, row.topAA, row.topBA, row.bottomAA, row.bottomBA].map(Math.abs)));

describe("Kirchhoff's current law", () => {
  test("holds at both terminals, at both rails and for the bridge at any instant, faults included", () => {
    fc.assert(
      fc.property(ANY, (document) => {
        const rows = simulate(document, { at: instants(document, 40) }).at;
        const slack = 1e-12 * sizeOf(rows);
        for (const row of rows) {
          expect(Math.abs(row.topAA - row.bottomAA - row.motorCurrentA)).toBeLessThanOrEqual(slack);
          expect(Math.abs(row.topBA - row.bottomBA + row.motorCurrentA)).toBeLessThanOrEqual(slack);
          expect(Math.abs(row.topAA + row.topBA - row.bridgeA)).toBeLessThanOrEqual(slack);
          expect(Math.abs(row.bottomAA + row.bottomBA - row.bridgeA)).toBeLessThanOrEqual(slack);
        }
      }),
      settings(11),
    );
  }, 60_000);
});

describe("energy", () => {
  test("adds up to better than one part in a million in every healthy run", () => {
    fc.assert(
      fc.property(HEALTHY, (document) => {
        const share = simulate(document).figures.energyResidualShare;
        if (share !== null) expect(share).toBeLessThan(1e-6);
      }),
      settings(12, 120),
    );
  }, 60_000);
});

describe("time", () => {
  test("asking for more instants changes no bit of any other result", () => {
    fc.assert(
      fc.property(ANY, (document) => {
        const few = instants(document, 5);
        const plain = simulate(document, { at: few });
        const dense = simulate(document, { at: [...few, ...instants(document, 83)].sort((a, b) => a - b) });
        const kept = dense.at.filter((row) => few.includes(row.timeS));
        expect(kept).toEqual(plain.at);
        expect({ figures: dense.figures, samples: dense.samples, events: dense.events }).toEqual({ figures: plain.figures, samples: plain.samples, events: plain.events });
      }),
      settings(13),
    );
  }, 60_000);
  test("the same document gives the same result bit for bit", () => {
    fc.assert(
      fc.property(ANY, (document) => {
        const at = instants(document, 7);
        expect(simulate(structuredClone(document), { at })).toEqual(simulate(document, { at }));
      }),
      settings(14),
    );
  }, 60_000);
  test("a run taken up after whole periods goes on as the uninterrupted one", () => {
    fc.assert(
      fc.property(HEALTHY, fc.integer({ min: 1, max: 3 }), (drawn, wholePeriods) => {
        const { frequencyHz } = drawn.pwm;
        const load = drawn.load.kind === "motor" ? { ...drawn.load, shaft: drawn.load.shaft.slice(0, 1).map((entry) => ({ ...entry, timeS: 0 })) } : drawn.load;
        const duty = drawn.command.points[0]?.duty ?? 0;
        fc.pre(duty !== 0 && drawn.load.kind !== "resistive" && drawn.supply.resistanceOhm === 0);
        const document: ScenarioDocument = {
          ...drawn,
          load,
          bridge: { ...drawn.bridge, deadTimeS: 0 },
          command: { points: [{ timeS: 0, duty: Math.abs(duty), ramp: "step" }], special: [], reversal: { kind: "direct", dwellS: 0 } },
          sensing: { ...drawn.sensing, shunt: { ...drawn.sensing.shunt, tcrPpmPerK: 0 } },
          run: { durationS: 6 / frequencyHz },
        };
        const shiftS = wholePeriods / frequencyHz;
        const offsets = [0.31, 1.17, 1.83, 2.61].map((share) => share / frequencyHz);
        const whole = simulate(document, { at: [shiftS, ...offsets.map((one) => shiftS + one)] }).at;
        const [from, ...rest] = whole;
        if (!from) throw new Error("no reading");
        const resumed = simulate({ ...document, initial: { currentA: from.motorCurrentA, speedRadPerS: from.speedRadPerS }, run: { durationS: 3 / frequencyHz } }, { at: offsets }).at;
        const [currentA, speed] = [sizeOf(whole), Math.max(1e-3, ...whole.map((row) => Math.abs(row.speedRadPerS)))];
        resumed.forEach((row, n) => {
          expect(Math.abs(row.motorCurrentA - (rest[n]?.motorCurrentA ?? Number.NaN)) / currentA).toBeLessThan(1e-7);
          expect(Math.abs(row.speedRadPerS - (rest[n]?.speedRadPerS ?? Number.NaN)) / speed).toBeLessThan(1e-7);
        });
      }),
      settings(15),
    );
  }, 60_000);
});

describe("continuity", () => {
  test("current, speed and bus voltage do not jump at any event", () => {
    const delta = 1e-12;
    fc.assert(
      fc.property(HEALTHY, (document) => {
        fc.pre(document.load.kind !== "resistive");
        const { events, durationS } = simulate(document);
        const times = [...new Set(events.map((event) => event.timeS))].filter((timeS) => timeS > 2 * delta && timeS < durationS - 2 * delta).slice(0, 120);
        const rows = simulate(document, { at: times.flatMap((timeS) => [timeS - 2 * delta, timeS - delta, timeS + delta, timeS + 2 * delta]) }).at;
        const { supply, load } = document;
        const henry = load.kind === "motor" ? load.motor.inductanceH : load.kind === "inductive" ? load.inductanceH : 1;
        const isCapacitive = supply.busCapacitanceF > 0 && supply.resistanceOhm > 0;
        for (let n = 0; n + 3 < rows.length; n += 4) {
          const [earlier, before, after, later] = rows.slice(n, n + 4);
          if (!earlier || !before || !after || !later) throw new Error("no reading");
          // Nothing here drives more than a few hundred volts through the winding, or 100 A through the bus capacitor.
          expect(Math.abs(after.motorCurrentA - before.motorCurrentA)).toBeLessThan((400 / henry) * 2 * delta + 1e-9);
          // Across the event the speed changes by what its slopes on both sides make of two deltas, not by a step.
          const slopeRadPerS = Math.max(Math.abs(before.speedRadPerS - earlier.speedRadPerS), Math.abs(later.speedRadPerS - after.speedRadPerS));
          expect(Math.abs(after.speedRadPerS - before.speedRadPerS)).toBeLessThan(2.1 * slopeRadPerS + 1e-9 * (1 + Math.abs(after.speedRadPerS)));
          if (isCapacitive) expect(Math.abs(after.busV - before.busV)).toBeLessThan((100 / supply.busCapacitanceF) * 2 * delta + 1e-6);
        }
      }),
      settings(16, 40),
    );
  }, 60_000);
});

/** The same bridge seen from the other side: command, state and weight negated, leg B's offset exchanged with A's. */
const mirror = (document: ScenarioDocument): ScenarioDocument => ({
  ...document,
  command: { ...document.command, points: document.command.points.map((point) => ({ ...point, duty: -point.duty })) },
  load: document.load.kind === "motor" ? { ...document.load, shaft: document.load.shaft.map((entry) => (entry.kind === "active" ? { ...entry, value: -entry.value } : entry)) } : document.load,
  sensing: { ...document.sensing, amplifier: { ...document.sensing.amplifier, offsetV: document.sensing.amplifier.offsetBV ?? document.sensing.amplifier.offsetV, offsetBV: document.sensing.amplifier.offsetV } },
  initial: { ...document.initial, currentA: -document.initial.currentA, speedRadPerS: -document.initial.speedRadPerS },
});

describe("mirror symmetry", () => {
  test("a negated command with exchanged legs gives negated current and speed and exchanged legs", () => {
    fc.assert(
      fc.property(HEALTHY, fc.constantFrom(0, 0.00029, -0.00031), (drawn, offsetBV) => {
        // Locked antiphase has one order of its two halves for both signs; at zero duty the bridge remembers "forward" (D-03).
        fc.pre(drawn.pwm.scheme !== "lockedAntiphase" && (drawn.command.points[0]?.duty ?? 0) !== 0);
        const document: ScenarioDocument = {
          ...drawn,
          command: { ...drawn.command, reversal: { kind: "direct", dwellS: 0 } },
          sensing: { ...drawn.sensing, amplifier: { ...drawn.sensing.amplifier, offsetBV } },
        };
        const at = instants(document, 24);
        const here = simulate(document, { at }).at;
        const there = simulate(mirror(document), { at }).at;
        const currentA = sizeOf(here);
        const speed = Math.max(1e-3, ...here.map((row) => Math.abs(row.speedRadPerS)));
        const isLegSite = document.sensing.site === "legTop" || document.sensing.site === "legBottom";
        here.forEach((row, n) => {
          const image = there[n];
          if (!image) throw new Error("no reading");
          expect(Math.abs(row.motorCurrentA + image.motorCurrentA) / currentA).toBeLessThan(1e-9);
          expect(Math.abs(row.speedRadPerS + image.speedRadPerS) / speed).toBeLessThan(1e-9);
          expect(Math.abs(row.topAA - image.topBA) / currentA).toBeLessThan(1e-9);
          expect(Math.abs(row.bottomBA - image.bottomAA) / currentA).toBeLessThan(1e-9);
          expect(Math.abs(row.busV - image.busV) / document.supply.voltageV).toBeLessThan(1e-9);
          if (!isLegSite) return;
          const outputV = document.sensing.amplifier.outputMaxV - document.sensing.amplifier.outputMinV;
          expect(Math.abs((row.outAV ?? Number.NaN) - (image.outBV ?? Number.NaN)) / outputV).toBeLessThan(1e-6);
          expect(Math.abs((row.outBV ?? Number.NaN) - (image.outAV ?? Number.NaN)) / outputV).toBeLessThan(1e-6);
        });
      }),
      settings(17),
    );
  }, 60_000);
});
