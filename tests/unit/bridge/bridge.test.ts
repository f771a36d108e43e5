import { describe, expect, it } from "vitest";
import { flowOf, routeOf } from "@/components/bridge/flow";
import { chevronsAlong, legPath, motorLoop, PHONE, ribbonsOf, ribbonWidth, roundClosedPath, WIDE } from "@/components/bridge/geometry";
import { staffPlaces } from "@/components/bridge/staffs";
import { conductionOf, describeState, limitWord, shuntWords } from "@/components/bridge/words";
import { readSensing } from "@/components/plot/sensing-facts";
import type { InstantReading, LegState } from "@/lib/engine/results";
import { reversalDocument, runOf } from "../plot/reversal";

const STATES: LegState[] = ["high channel", "low channel", "high diode", "low diode", "open"];
const isHigh = (state: LegState) => state.startsWith("high");

/** A reading whose rail currents follow from the leg states by model.md's table. */
function readingOf(stateA: LegState, stateB: LegState, motorA: number, more: Partial<InstantReading> = {}): InstantReading {
  const isOpen = stateA === "open" || stateB === "open";
  const i = isOpen ? 0 : motorA;
  const topAA = isHigh(stateA) ? i : 0;
  const topBA = isHigh(stateB) ? -i : 0;
  return {
    timeS: 1e-4, dutyCommand: 0.5, motorCurrentA: i, speedRadPerS: 40, busV: 24, terminalAV: 0, terminalBV: 0,
    topAA, topBA, bottomAA: isHigh(stateA) ? 0 : -i, bottomBA: isHigh(stateB) ? 0 : i, supplyA: topAA + topBA, bridgeA: topAA + topBA,
    senseAV: topAA * 0.01, senseBV: topBA * 0.01, outAV: 0.02, outBV: 0.02, differenceV: 0, combinedV: 1.65,
    state: { A: stateA, B: stateB }, ...more,
  };
}

const facts = readSensing(reversalDocument("legTop"));

describe("the path of the current", () => {
  it("exists for every pair of leg states that conducts, and for no other", () => {
    for (const A of STATES) {
      for (const B of STATES) {
        const loop = motorLoop(WIDE, flowOf(readingOf(A, B, 3)));
        if (A === "open" || B === "open") expect(loop).toBeNull();
        else expect(loop!.length).toBeGreaterThanOrEqual(4);
      }
    }
  });

  it("runs level or upright all round, closes, and passes the motor from A to B when forward", () => {
    for (const geometry of [WIDE, PHONE]) {
      for (const A of STATES.slice(0, 4)) {
        for (const B of STATES.slice(0, 4)) {
          for (const motorA of [3, -2]) {
            const loop = motorLoop(geometry, flowOf(readingOf(A, B, motorA)))!;
            loop.forEach((point, index) => {
              const next = loop[(index + 1) % loop.length]!;
              expect(point[0] === next[0] || point[1] === next[1]).toBe(true);
            });
            const atA = loop.findIndex(([x, y]) => x === geometry.xA && y === geometry.yMid);
            const after = loop[(atA + (motorA > 0 ? 1 : loop.length - 1)) % loop.length]!;
            expect(after).toEqual([geometry.xB, geometry.yMid]);
          }
        }
      }
    }
  });

  it("takes the supply in only when the legs stand on different rails", () => {
    const touches = (A: LegState, B: LegState) => motorLoop(WIDE, flowOf(readingOf(A, B, 3)))!.some(([x]) => x === WIDE.xSupply);
    expect(touches("high channel", "low channel")).toBe(true);
    expect(touches("low diode", "high diode")).toBe(true);
    expect(touches("low channel", "low diode")).toBe(false);
    expect(touches("high channel", "high channel")).toBe(false);
  });

  it("goes round by the side channel where a diode conducts", () => {
    expect(legPath(WIDE, "A", { side: "low", isDiode: true }).some(([x]) => x < WIDE.xA)).toBe(true);
    expect(legPath(WIDE, "B", { side: "high", isDiode: true }).some(([x]) => x > WIDE.xB)).toBe(true);
    expect(legPath(WIDE, "B", { side: "high", isDiode: false })).toHaveLength(2);
  });

  it("adds a ribbon through the leg for a shoot-through and keeps the motor's own", () => {
    const reading = readingOf("high channel", "low channel", 3, { topAA: 83, bottomAA: 80, bridgeA: 83 });
    const ribbons = ribbonsOf(WIDE, flowOf(reading));
    expect(ribbons.map((ribbon) => [ribbon.kind, ribbon.currentA])).toEqual([
      ["throughA", 80],
      ["motor", 3],
    ]);
    expect(conductionOf(reading)).toBe("shootThrough");
  });

  it("in a shorted leg takes the side that is left over", () => {
    const flow = flowOf(readingOf("high channel", "low channel", -3, { topAA: 80, bottomAA: 83 }));
    expect(flow.A.side).toBe("low");
  });
});

describe("the ribbon", () => {
  it("grows from 1.8 to 12.4 and is absent at no current", () => {
    expect(ribbonWidth(0, 6)).toBe(0);
    expect(ribbonWidth(0.029, 6)).toBe(0);
    expect(ribbonWidth(-6, 6)).toBeCloseTo(12.4, 12);
    expect(ribbonWidth(60, 6)).toBeCloseTo(12.4, 12);
    expect(ribbonWidth(3, 6)).toBeCloseTo(7.1, 12);
    expect(ribbonWidth(3, NaN)).toBe(0);
  });

  it("has rounded corners and chevrons clear of them", () => {
    const square = [[0, 0], [100, 0], [100, 100], [0, 100]] as const;
    expect(roundClosedPath(square, 9)).toMatch(/^M0 9Q0 0 9 0L91 0Q100 0 100 9/);
    const places = chevronsAlong(square, 30, 13);
    expect(places.length).toBe(12);
    expect(places.every(({ x, y }) => Math.min(x, 100 - x) < 1e-9 || Math.min(y, 100 - y) < 1e-9)).toBe(true);
    expect(places.filter(({ y }) => y === 0).every(({ x, angleDeg }) => x >= 13 && x <= 87 && angleDeg === 0)).toBe(true);
  });
});

describe("staffs", () => {
  it("stand where the site puts them, inside the drawing", () => {
    for (const geometry of [WIDE, PHONE]) {
      expect(staffPlaces(geometry, "legTop").map((place) => place.leg)).toEqual(["A", "B"]);
      expect(staffPlaces(geometry, "legTop")[0]!.y).toBeLessThan(geometry.yHigh);
      expect(staffPlaces(geometry, "legBottom")[0]!.y).toBeGreaterThan(geometry.yLow);
      expect(staffPlaces(geometry, "supply")[0]!.y).toBeLessThan(staffPlaces(geometry, "return")[0]!.y);
      const [line] = staffPlaces(geometry, "line");
      expect(line!.x).toBeGreaterThan(geometry.xA);
      expect(line!.x).toBeLessThan((geometry.xA + geometry.xB) / 2 - geometry.motorRadius);
    }
  });
});

describe("words", () => {
  const title = (A: LegState, B: LegState, i: number) => describeState(readingOf(A, B, i), facts, 6.5);

  it("name every conduction state", () => {
    expect(title("high channel", "low channel", 3)).toMatchObject({ title: "Drive, forward", who: "AH and BL", supply: "gives" });
    expect(title("low channel", "high channel", -3)).toMatchObject({ title: "Drive, reverse", who: "AL and BH", supply: "gives" });
    expect(title("low channel", "high channel", 3)).toMatchObject({ title: "Return to supply", who: "AL and BH", supply: "takes back" });
    expect(title("low channel", "low channel", 3)).toMatchObject({ title: "Recirculation", who: "AL and BL", supply: "idle" });
    expect(title("high channel", "high channel", -3)).toMatchObject({ title: "Recirculation", who: "AH and BH", supply: "idle" });
    expect(title("low diode", "low channel", 3)).toMatchObject({ title: "Recirculation", who: "dead time: AL diode and BL" });
    expect(title("low diode", "high diode", 3)).toMatchObject({ title: "Coasting", who: "AL diode and BH diode", supply: "takes back" });
    expect(title("open", "open", 0)).toMatchObject({ title: "Coasting", who: "all off, no current", supply: "idle" });
    expect(title("open", "low channel", 0)).toMatchObject({ title: "No current", who: "dead time: leg A open and BL" });
    expect(describeState(readingOf("high channel", "low channel", 3, { topAA: 83, bottomAA: 80 }), facts, 6.5)).toMatchObject({ title: "Shoot-through", who: "AH and AL both on" });
  });

  it("trust the band over a guess: recirculation through a diode is not dead time", () => {
    const gates = { highA: false, lowA: false, highB: false, lowB: true };
    expect(describeState(readingOf("low diode", "low channel", 3), facts, 6.5, { conduction: "recirculateLow", gates })).toMatchObject({ title: "Recirculation", who: "AL diode and BL" });
  });

  it("agree with the engine's bands over a whole reversal", () => {
    const { view, readAt } = runOf(reversalDocument("legTop"));
    for (const band of view.bands) expect(conductionOf(readAt((band.fromS + band.toS) / 2), band.gates)).toBe(band.conduction);
  });

  it("say the state in one sentence with amperes, supply, shunts and output", () => {
    const reading = readingOf("low channel", "high channel", 3.84, { combinedV: 1.65, senseBV: -0.0384 });
    expect(describeState(reading, facts, 6.5).sentence).toBe(
      "Return to supply: AL and BH. Motor 3.84 A forward. The supply takes back 3.84 A. Shunt A 0.0 mV across, no current, output A 0.020 V at floor. " +
        "Shunt B −38.4 mV across, 3.84 A up, output B 0.020 V at floor. Combined output 1.650 V at midscale.",
    );
  });

  it("give one shunt outside the legs, with words of its place", () => {
    const of = (site: "line" | "supply" | "return", i: number) => shuntWords(readingOf("high channel", "low channel", i, { senseBV: null, outAV: null }), readSensing(reversalDocument(site)));
    expect(of("line", -2)).toMatchObject([{ name: "Shunt", flow: "2.00 A reverse", output: null }]);
    expect(of("supply", 2)[0]!.flow).toBe("2.00 A to the bridge");
    expect(of("return", 2)[0]!.flow).toBe("2.00 A to ground");
  });

  it("know floor, ceiling and midscale", () => {
    expect([0.0205, 3.2799, 1.651, 2].map((value) => limitWord(value, facts))).toEqual(["at floor", "at ceiling", "at midscale", ""]);
  });
});

describe("routes", () => {
  it("follow legs and sign", () => {
    expect(routeOf(flowOf(readingOf("high channel", "low channel", -1)))).toBe("returnReverse");
    expect(routeOf(flowOf(readingOf("low diode", "high channel", 1)))).toBe("returnForward");
    expect(routeOf(flowOf(readingOf("open", "high channel", 1)))).toBe("none");
  });
});
