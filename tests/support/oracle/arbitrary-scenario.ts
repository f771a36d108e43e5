import fc from "fast-check";
import { rangeOf } from "@/lib/scenario/ranges";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { arbitraryFaults } from "./arbitrary-faults";
import { baseDocument } from "./base-document";

/**
 * Documents that the schema accepts. Every number is drawn from an everyday span or, with the given weight out of ten,
 * from the whole allowed range including both its ends. Runs have at most `PERIODS` PWM periods.
 */
export type Wildness = { weight: number };
export const PERIODS = 24;

/** Evenly drawn, in a million steps: everyday numbers, not the odd corners of floating point. */
export const uniform = (low: number, high: number): fc.Arbitrary<number> => fc.integer({ min: 0, max: 1_000_000 }).map((n) => low + ((high - low) * n) / 1_000_000);

/** Log-uniform between two positive numbers. */
export const spread = (low: number, high: number): fc.Arbitrary<number> =>
  uniform(Math.log(low), Math.log(high)).map((x) => Math.min(high, Math.max(low, Math.exp(x))));

const wholeRange = (path: string): fc.Arbitrary<number> => {
  const range = rangeOf(path);
  if (!range) throw new Error(`no range for ${path}`);
  const top = range.isMaxOpen ? range.max * (1 - 1e-9) : range.max;
  const smallest = range.min > 0 ? range.min : Math.max(range.floor ?? 0, top * 1e-12, 1e-15);
  const ends = [range.min, top, ...(range.floor ? [range.floor] : []), ...(range.min <= 0 ? [0] : [])];
  const inside = range.min < 0 ? fc.oneof(spread(smallest, top), spread(smallest, Math.abs(range.min)).map((x) => -x)) : spread(smallest, top);
  const drawn = fc.oneof(fc.constantFrom(...ends), inside);
  return range.isWhole ? drawn.map((x) => Math.min(top, Math.max(range.min, Math.round(x)))) : drawn;
};

/** A number of everyday size, or any that is allowed. */
export const quantity = (path: string, everyday: fc.Arbitrary<number>, wild: Wildness): fc.Arbitrary<number> =>
  wild.weight === 0 ? everyday : fc.oneof({ weight: 10 - wild.weight, arbitrary: everyday }, { weight: wild.weight, arbitrary: wholeRange(path) });

const side = (name: "highSide" | "lowSide", wild: Wildness) =>
  fc.record({
    onResistanceOhm: quantity(`bridge.${name}.onResistanceOhm`, spread(1e-3, 0.2), wild),
    diodeForwardV: quantity(`bridge.${name}.diodeForwardV`, uniform(0.3, 1.2), wild),
    diodeResistanceOhm: quantity(`bridge.${name}.diodeResistanceOhm`, spread(1e-3, 0.1), wild),
  });

const arbitraryPwm = (wild: Wildness): fc.Arbitrary<ScenarioDocument["pwm"]> =>
  fc
    .record({
      frequencyHz: quantity("pwm.frequencyHz", spread(4000, 60000), wild),
      alignment: fc.constantFrom("edge" as const, "centre" as const),
      scheme: fc.constantFrom("lowSideRecirculation" as const, "highSideRecirculation" as const, "fastDecay" as const, "mixedDecay" as const, "lockedAntiphase" as const),
      synchronous: fc.boolean(),
      mixedFastShare: uniform(0, 1),
    })
    .map(({ mixedFastShare, ...pwm }) => ({
      ...pwm,
      alignment: pwm.scheme === "mixedDecay" ? ("edge" as const) : pwm.alignment,
      synchronous: pwm.scheme === "lockedAntiphase" || pwm.synchronous,
      ...(pwm.scheme === "mixedDecay" ? { mixedFastShare } : {}),
    }));

const duty = fc.oneof({ weight: 6, arbitrary: uniform(-1, 1) }, { weight: 1, arbitrary: fc.constantFrom(0, 1, -1, 1e-9, 0.999999) });

const arbitraryCommand = (durationS: number, scheme: string): fc.Arbitrary<ScenarioDocument["command"]> =>
  fc
    .record({
      first: duty,
      more: fc.array(fc.record({ share: uniform(0.01, 0.99), duty, ramp: fc.constantFrom("step" as const, "linear" as const) }), { maxLength: 3 }),
      special: fc.option(fc.record({ from: uniform(0, 0.8), length: uniform(0.001, 0.19), action: fc.constantFrom("coast" as const, "brakeLow" as const, "brakeHigh" as const) }), { nil: undefined }),
      reversal: fc.record({ kind: fc.constantFrom("direct" as const, "coast" as const, "brakeLow" as const), dwellS: uniform(0, 0.3).map((x) => x * durationS) }),
    })
    .map(({ first, more, special, reversal }) => ({
      points: [
        { timeS: 0, duty: first, ramp: "step" as const },
        ...[...new Map(more.map((one) => [one.share, one])).values()]
          .sort((a, b) => a.share - b.share)
          .map((one) => ({ timeS: one.share * durationS, duty: one.duty, ramp: one.ramp })),
      ],
      special: special ? [{ fromS: special.from * durationS, toS: (special.from + special.length) * durationS, action: special.action }] : [],
      reversal: scheme === "lockedAntiphase" ? { kind: "direct" as const, dwellS: 0 } : reversal,
    }));

const arbitraryMotor = (wild: Wildness) =>
  fc.record({
    resistanceOhm: quantity("load.motor.resistanceOhm", spread(0.1, 10), wild),
    inductanceH: quantity("load.motor.inductanceH", spread(5e-5, 5e-3), wild),
    torqueConstantNmPerA: quantity("load.motor.torqueConstantNmPerA", spread(0.005, 0.2), wild),
    inertiaKgM2: quantity("load.motor.inertiaKgM2", spread(1e-6, 1e-3), wild),
    viscousNmPerRadPerS: quantity("load.motor.viscousNmPerRadPerS", spread(1e-7, 1e-4), wild),
    coulombNm: quantity("load.motor.coulombNm", fc.constantFrom(0, 0.003, 0.02), wild),
    staticNm: quantity("load.motor.staticNm", fc.constantFrom(0, 0.004, 0.03), wild),
    temperatureC: quantity("load.motor.temperatureC", fc.constantFrom(20, 63), wild),
    locked: fc.constantFrom(false, false, false, true),
  });

const arbitraryLoad = (durationS: number, wild: Wildness): fc.Arbitrary<ScenarioDocument["load"]> => {
  const shaftEntry = fc
    .record({ kind: fc.constantFrom("none" as const, "constant" as const, "active" as const, "viscous" as const, "fan" as const), share: uniform(0, 1), value: spread(1e-6, 0.1), sign: fc.constantFrom(1, -1), wildValue: quantity("load.shaft.*.value", fc.constant(0), wild) })
    .map(({ kind, share, value, sign, wildValue }) => ({
      timeS: share * durationS,
      kind,
      value: kind === "active" ? (wildValue || value * sign) : kind === "none" ? 0 : Math.abs(wildValue) || (kind === "constant" ? value : value * 1e-3),
    }));
  const motor = fc.record({
    kind: fc.constant("motor" as const),
    motor: arbitraryMotor(wild).map((one) => ({ ...one, backEmfVPerRadPerS: one.torqueConstantNmPerA, staticNm: Math.max(one.staticNm, one.coulombNm) })),
    shaft: fc.array(shaftEntry, { maxLength: 2 }).map((list) => [...new Map(list.map((one) => [one.timeS, one])).values()].sort((a, b) => a.timeS - b.timeS)),
  });
  const inductive = fc.record({ kind: fc.constant("inductive" as const), resistanceOhm: quantity("load.resistanceOhm", spread(0.3, 30), wild), inductanceH: quantity("load.inductanceH", spread(1e-4, 1e-2), wild) });
  const resistive = fc.record({ kind: fc.constant("resistive" as const), resistanceOhm: quantity("load.resistanceOhm", spread(0.5, 50), wild) });
  return fc.oneof({ weight: 6, arbitrary: motor }, { weight: 1, arbitrary: inductive }, { weight: 1, arbitrary: resistive });
};

const arbitraryAmplifier = (wild: Wildness) =>
  fc.record({
    response: fc.constantFrom("unipolar" as const, "bipolar" as const),
    fixed: quantity("sensing.amplifier.gain.fixed", spread(5, 100), wild),
    outOhm: quantity("sensing.amplifier.gain.outOhm", spread(5000, 50000), wild),
    isCurrentOutput: fc.boolean(),
    offsetV: quantity("sensing.amplifier.offsetV", fc.constantFrom(0, 1.7e-4, -2.3e-4), wild),
    bandwidthHz: quantity("sensing.amplifier.bandwidthHz", spread(3e4, 2e6), wild),
    gainBandwidthHz: fc.option(quantity("sensing.amplifier.gainBandwidthHz", spread(1e6, 1e8), wild), { nil: undefined }),
    slewVPerS: fc.option(quantity("sensing.amplifier.slewVPerS", spread(1e5, 1e7), wild), { nil: undefined }),
    cmrrDb: quantity("sensing.amplifier.cmrrDb", fc.constantFrom(90, 120), wild),
    outputMaxV: fc.constantFrom(0.7, 3.3, 5, 50),
    outputMinV: fc.constantFrom(0, 0, -50, 0.05),
  });

const arbitrarySensing = (wild: Wildness): fc.Arbitrary<ScenarioDocument["sensing"]> =>
  fc
    .record({
      site: fc.constantFrom("legTop" as const, "legBottom" as const, "line" as const, "supply" as const, "return" as const),
      choice: fc.nat(2),
      hasReference: fc.boolean(),
      resistanceOhm: quantity("sensing.shunt.resistanceOhm", spread(1e-3, 0.05), wild),
      inductanceH: quantity("sensing.shunt.inductanceH", fc.constantFrom(0, 0, 1.3e-9), wild),
      tcrPpmPerK: quantity("sensing.shunt.tcrPpmPerK", fc.constantFrom(0, 70), wild),
      thermalResistanceKPerW: quantity("sensing.shunt.thermalResistanceKPerW", fc.constantFrom(0, 40), wild),
      amplifier: arbitraryAmplifier(wild),
      filter: fc.option(fc.record({ resistanceOhm: quantity("sensing.filter.resistanceOhm", spread(50, 2000), wild), capacitanceF: quantity("sensing.filter.capacitanceF", spread(1e-10, 1e-8), wild) }), { nil: undefined }),
      referenceV: quantity("sensing.reference.voltageV", fc.constantFrom(0.3, 1.65, 2.5), wild),
      converter: fc.record({
        bits: quantity("sensing.converter.bits", fc.constantFrom(10, 12, 16), wild),
        fullScaleV: quantity("sensing.converter.fullScaleV", fc.constantFrom(2.5, 3.3), wild),
        input: fc.constantFrom("unipolar" as const, "differential" as const),
        phase: quantity("sensing.converter.phase", uniform(0, 0.999), wild),
        perPeriod: quantity("sensing.converter.perPeriod", fc.constantFrom(1, 1, 3), wild),
        average: quantity("sensing.converter.average", fc.constantFrom(1, 1, 2), wild),
        apertureS: quantity("sensing.converter.apertureS", fc.constantFrom(0, 0, 1.1e-6), wild),
      }),
    })
    .map((drawn) => {
      const base = baseDocument().sensing;
      const isLeg = drawn.site === "legTop" || drawn.site === "legBottom";
      const choices = isLeg ? (["singleEnded", "differencePair", "combinedMidscale"] as const) : (["singleEnded", "bipolarMidscale"] as const);
      const arrangement = choices[drawn.choice % choices.length] ?? "singleEnded";
      const isMidscale = arrangement === "combinedMidscale" || arrangement === "bipolarMidscale";
      const { isCurrentOutput, fixed, outOhm, gainBandwidthHz, slewVPerS, ...amplifier } = drawn.amplifier;
      return {
        site: drawn.site,
        shunt: { ...base.shunt, resistanceOhm: drawn.resistanceOhm, inductanceH: drawn.inductanceH, tcrPpmPerK: drawn.tcrPpmPerK, thermalResistanceKPerW: drawn.thermalResistanceKPerW },
        amplifier: {
          ...base.amplifier,
          ...amplifier,
          arrangement,
          response: arrangement === "bipolarMidscale" ? ("bipolar" as const) : amplifier.response,
          gain: isCurrentOutput ? { inOhm: 1000, outOhm } : { fixed },
          ...(gainBandwidthHz === undefined ? {} : { gainBandwidthHz }),
          ...(slewVPerS === undefined ? {} : { slewVPerS }),
        },
        converter: { ...base.converter, ...drawn.converter },
        ...(isMidscale || (isLeg && drawn.hasReference) ? { reference: { voltageV: drawn.referenceV, tolerancePct: 0, tempcoPpmPerK: 0, sampledByConverter: false } } : {}),
        ...(drawn.filter === undefined ? {} : { filter: isCurrentOutput ? { capacitanceF: drawn.filter.capacitanceF } : drawn.filter }),
      };
    });

const arbitrarySupply = (wild: Wildness): fc.Arbitrary<ScenarioDocument["supply"]> =>
  fc
    .record({
      voltageV: quantity("supply.voltageV", spread(5, 60), wild),
      resistanceOhm: quantity("supply.resistanceOhm", fc.constantFrom(0, 0, 0.05, 0.3), wild),
      busCapacitanceF: quantity("supply.busCapacitanceF", fc.constantFrom(0, 0, 2.2e-5, 4.7e-4), wild),
      acceptsReturn: fc.boolean(),
    })
    .map((one) => ({ ...one, acceptsReturn: one.acceptsReturn || one.resistanceOhm === 0 || one.busCapacitanceF === 0 }));

const finish = (parts: Pick<ScenarioDocument, "supply" | "bridge" | "pwm" | "command" | "load" | "sensing" | "faults"> & { durationS: number; currentA: number; speed: number }): ScenarioDocument => {
  const { durationS, currentA, speed, ...rest } = parts;
  const { load, sensing } = rest;
  const isResistive = load.kind === "resistive";
  const shuntH = isResistive ? 0 : sensing.shunt.inductanceH;
  // Conversions must not overlap (the schema refuses an aperture longer than their distance).
  const betweenS = 0.99 / (rest.pwm.frequencyHz * sensing.converter.perPeriod);
  const converter = { ...sensing.converter, apertureS: Math.min(sensing.converter.apertureS, betweenS) };
  const isStill = load.kind !== "motor" || load.motor.locked;
  return {
    ...baseDocument(),
    ...rest,
    sensing: { ...sensing, converter, shunt: { ...sensing.shunt, inductanceH: shuntH } },
    bridge: { ...rest.bridge, commutationS: shuntH > 0 && rest.bridge.commutationS === 0 ? 1e-12 : rest.bridge.commutationS },
    initial: { currentA: isResistive ? 0 : currentA, speedRadPerS: isStill ? 0 : speed },
    run: { durationS },
  };
};

export const arbitraryScenario = (wild: Wildness, options: { withFaults: boolean } = { withFaults: true }): fc.Arbitrary<ScenarioDocument> =>
  fc
    .record({ pwm: arbitraryPwm(wild), periods: uniform(2, PERIODS) })
    .chain(({ pwm, periods }) => {
      const durationS = Math.min(60, Math.max(1e-6, periods / pwm.frequencyHz));
      const sensing = arbitrarySensing(wild);
      const load = arbitraryLoad(durationS, wild);
      return fc.tuple(sensing, load).chain(([sensingPart, loadPart]) =>
        fc
          .record({
            supply: arbitrarySupply(wild),
            bridge: fc.record({ highSide: side("highSide", wild), lowSide: side("lowSide", wild), deadTimeS: quantity("bridge.deadTimeS", spread(1e-7, 1e-6), wild), commutationS: quantity("bridge.commutationS", spread(1e-8, 2e-7), wild) }),
            pwm: fc.constant(pwm),
            command: arbitraryCommand(durationS, pwm.scheme),
            load: fc.constant(loadPart),
            sensing: fc.constant(sensingPart),
            faults: options.withFaults ? arbitraryFaults(durationS, sensingPart, loadPart.kind, wild) : fc.constant<ScenarioDocument["faults"]>([]),
            durationS: fc.constant(durationS),
            currentA: quantity("initial.currentA", uniform(-5, 5), wild),
            speed: quantity("initial.speedRadPerS", uniform(-300, 300), wild),
          })
          .map(finish),
      );
    });
