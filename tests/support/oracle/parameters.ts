import type { ScenarioDocument } from "@/lib/scenario/schema";
import type { SensingParameters } from "./channels";
import type { ShaftParameters } from "./shaft";
import type { StageParameters } from "./stage";

/** Turns a document, with the faults and shaft entries that have come into force, into the numbers of the three parts. */
export type Fault = ScenarioDocument["faults"][number];
type FaultOf<K extends Fault["kind"]> = Extract<Fault, { kind: K }>;

export type Circumstances = {
  faults: Fault[];
  /** Index of the shaft entry in force, -1: none yet. */
  shaftIndex: number;
  windingC: number;
  shuntC: [number, number];
};

const COPPER_PER_K = 0.00393;
const pick = <K extends Fault["kind"]>(state: Circumstances, kind: K): FaultOf<K>[] =>
  state.faults.filter((fault): fault is FaultOf<K> => fault.kind === kind);
const legIndex = (fault: { leg?: "A" | "B" | undefined }): 0 | 1 => (fault.leg === "B" ? 1 : 0);
const product = (factors: number[]): number => factors.reduce((a, b) => a * b, 1);

/** Real resistance of both shunts: temperature and faults. */
const shuntResistances = (document: ScenarioDocument, state: Circumstances): [number, number] => {
  const { resistanceOhm, tcrPpmPerK } = document.sensing.shunt;
  const real = ([0, 1] as const).map((x) => {
    const drift = product(pick(state, "shuntDrifted").filter((fault) => legIndex(fault) === x).map((fault) => fault.factor));
    const isShorted = pick(state, "shuntShorted").some((fault) => legIndex(fault) === x);
    return isShorted ? 0 : resistanceOhm * (1 + tcrPpmPerK * 1e-6 * (state.shuntC[x] - 25)) * drift;
  });
  return [real[0] ?? 0, real[1] ?? 0];
};

const loadNumbers = (document: ScenarioDocument, state: Circumstances) => {
  const load = document.load;
  const worn = product(pick(state, "wornBrushes").map((fault) => fault.factor));
  const shorted = pick(state, "shortedTurns");
  const resistanceFactor = worn * product(shorted.map((fault) => fault.resistanceFactor));
  const inductanceFactor = product(shorted.map((fault) => fault.inductanceFactor));
  const torqueFactor = product(shorted.map((fault) => fault.torqueFactor));
  if (load.kind === "motor") {
    const { motor } = load;
    return {
      loadKind: load.kind,
      windingOhm: motor.resistanceOhm * (1 + COPPER_PER_K * (state.windingC - 20)) * resistanceFactor,
      inductanceH: motor.inductanceH * inductanceFactor,
      torqueNmPerA: motor.torqueConstantNmPerA * torqueFactor,
      emfVs: motor.backEmfVPerRadPerS * torqueFactor,
    };
  }
  const inductanceH = load.kind === "inductive" ? load.inductanceH * inductanceFactor : 0;
  return { loadKind: load.kind, windingOhm: load.resistanceOhm * resistanceFactor, inductanceH, torqueNmPerA: 0, emfVs: 0 };
};

export const stageParameters = (document: ScenarioDocument, state: Circumstances): StageParameters => {
  const { supply, bridge, sensing } = document;
  const ohm = shuntResistances(document, state);
  const at = (site: string): number => (sensing.site === site ? ohm[0] : 0);
  const half = (side: typeof bridge.highSide) => ({ onOhm: side.onResistanceOhm, diodeV: side.diodeForwardV, diodeOhm: side.diodeResistanceOhm });
  return {
    sourceV: pick(state, "supplySag").at(-1)?.voltageV ?? supply.voltageV,
    sourceOhm: supply.resistanceOhm,
    busF: supply.busCapacitanceF,
    acceptsReturn: supply.acceptsReturn,
    high: half(bridge.highSide),
    low: half(bridge.lowSide),
    topOhm: sensing.site === "legTop" ? ohm : [0, 0],
    bottomOhm: sensing.site === "legBottom" ? ohm : [0, 0],
    lineOhm: at("line"),
    supplyOhm: at("supply"),
    returnOhm: at("return"),
    ...loadNumbers(document, state),
    isWindingOpen: pick(state, "openWinding").length > 0,
  };
};

const STILL: ShaftParameters = {
  inertia: 1,
  viscous: 0,
  fan: 0,
  coulomb: { fromNm: 0, toNm: 0, sinceS: 0, overS: 0 },
  staticNm: 0,
  constantNm: 0,
  activeNm: { forward: 0, backward: 0 },
  isLocked: true,
};

export const shaftParameters = (document: ScenarioDocument, state: Circumstances): ShaftParameters => {
  const load = document.load;
  if (load.kind !== "motor") return STILL;
  const { motor } = load;
  const n = load.gear?.ratio ?? 1;
  const eta = load.gear?.efficiency ?? 1;
  const entry = pick(state, "lostLoad").length > 0 ? undefined : load.shaft[state.shaftIndex];
  const value = (kind: string): number => (entry?.kind === kind ? entry.value : 0);
  const rising = pick(state, "risingFriction").at(-1);
  const weight = value("active");
  return {
    inertia: motor.inertiaKgM2 + (load.gear?.loadInertiaKgM2 ?? 0) / n ** 2,
    viscous: motor.viscousNmPerRadPerS + value("viscous") / (n ** 2 * eta),
    fan: value("fan") / (n ** 3 * eta),
    coulomb: {
      fromNm: motor.coulombNm,
      toNm: rising?.coulombNm ?? motor.coulombNm,
      sinceS: rising?.atS ?? 0,
      overS: rising?.overS ?? 0,
    },
    staticNm: motor.staticNm,
    constantNm: value("constant") / (n * eta),
    activeNm: {
      forward: weight >= 0 ? weight / (n * eta) : (weight * eta) / n,
      backward: weight <= 0 ? weight / (n * eta) : (weight * eta) / n,
    },
    isLocked: motor.locked || pick(state, "stalledRotor").length > 0,
  };
};

export const sensingParameters = (document: ScenarioDocument, state: Circumstances): SensingParameters => {
  const { amplifier, filter, shunt, site, reference } = document.sensing;
  const isCurrentOutput = "outOhm" in amplifier.gain;
  const gain = "outOhm" in amplifier.gain ? amplifier.gain.outOhm / amplifier.gain.inOhm : amplifier.gain.fixed;
  const filterOhm = "outOhm" in amplifier.gain ? amplifier.gain.outOhm : (filter?.resistanceOhm ?? 0);
  const bandwidthHz = Math.min(amplifier.bandwidthHz, (amplifier.gainBandwidthHz ?? Infinity) / gain);
  const shift = (x: 0 | 1): number => pick(state, "amplifierOffsetShift").filter((fault) => legIndex(fault) === x).reduce((sum, fault) => sum + fault.deltaV, 0);
  const stuck = (x: 0 | 1): number | null => pick(state, "amplifierStuckOutput").filter((fault) => legIndex(fault) === x).at(-1)?.voltageV ?? null;
  return {
    site,
    shuntOhm: shuntResistances(document, state),
    shuntH: shunt.inductanceH,
    offsetV: [amplifier.offsetV + shift(0), (amplifier.offsetBV ?? amplifier.offsetV) + shift(1)],
    rejection: 10 ** (-amplifier.cmrrDb / 20),
    commonModeZeroV: site === "legTop" || site === "supply" ? document.supply.voltageV : 0,
    gain,
    amplifierTau: 1 / (2 * Math.PI * bandwidthHz),
    filterTau: filterOhm * (filter?.capacitanceF ?? 0),
    isCurrentOutput,
    slewVPerS: amplifier.slewVPerS ?? Infinity,
    minV: amplifier.outputMinV,
    maxV: amplifier.outputMaxV,
    isUnipolar: amplifier.response === "unipolar",
    referenceV: (reference?.voltageV ?? 0) + pick(state, "referenceDrift").reduce((sum, fault) => sum + fault.deltaV, 0),
    hasReference: reference !== undefined,
    isMidscale: amplifier.arrangement === "combinedMidscale" || amplifier.arrangement === "bipolarMidscale",
    stuckV: [stuck(0), stuck(1)],
  };
};

/** Which switches really conduct: stuck and shorted ones do not follow the gate (D-35). */
export const effectiveGates = (state: Circumstances, requested: readonly { high: boolean; low: boolean }[]): { high: boolean; low: boolean }[] =>
  requested.map((gate, x) => {
    const has = (kind: "switchStuckOpen" | "switchShorted", side: "high" | "low"): boolean =>
      pick(state, kind).some((fault) => legIndex(fault) === x && fault.side === side);
    const real = (side: "high" | "low"): boolean => has("switchShorted", side) || (gate[side] && !has("switchStuckOpen", side));
    return { high: real("high"), low: real("low") };
  });
