import type { Fault, ScenarioDocument } from "../../scenario/schema";

/**
 * Constants of the power stage that hold between two changes (shaft load steps, fault onsets, winding temperature).
 * SI units in the names. Shunt resistances are those that act at their temperature; sites that have no shunt hold 0.
 */
export type StageParameters = {
  sourceV: number;
  sourceOhm: number;
  busF: number;
  /** The bus voltage is a state: capacitance behind a source resistance. Otherwise it is algebraic (or stiff). */
  hasBusState: boolean;
  acceptsReturn: boolean;
  highOnOhm: number;
  lowOnOhm: number;
  highDiodeV: number;
  lowDiodeV: number;
  highDiodeOhm: number;
  lowDiodeOhm: number;
  topAOhm: number;
  topBOhm: number;
  bottomAOhm: number;
  bottomBOhm: number;
  lineOhm: number;
  supplyShuntOhm: number;
  returnShuntOhm: number;
  isResistive: boolean;
  windingOhm: number;
  inductanceH: number;
  backEmfVPerRadPerS: number;
  torqueNmPerA: number;
  inertiaKgM2: number;
  viscousNmPerRadPerS: number;
  coulombNm: number;
  /** Rate at which `coulombNm` rises (fault `risingFriction`); the solver takes the middle of each short interval. */
  coulombRateNmPerS: number;
  staticNm: number;
  constantNm: number;
  /** Gravity-like torque at the motor shaft while it opposes, and while it drives, the motion (D-11). */
  activeOpposingNm: number;
  activeDrivingNm: number;
  fanNmPerRadPerS2: number;
  isLocked: boolean;
  isWindingOpen: boolean;
  /** Gate ignored (off) / always on, in the order high A, low A, high B, low B. */
  stuckOpen: readonly [boolean, boolean, boolean, boolean];
  shorted: readonly [boolean, boolean, boolean, boolean];
  /** An open shunt interrupts the rail of leg A, of leg B, or the single shunt's branch. */
  openShunt: readonly [boolean, boolean, boolean];
};

export const COPPER_PER_KELVIN = 0.00393; // temperature coefficient of copper at 20 degC, model.md section 1

/** Resistance of each shunt (leg A and B, or the single one twice) at its temperature, faults left out. */
export type ShuntResistances = { aOhm: number; bOhm: number };

/** Beyond this a shunt has melted and its linear coefficient means nothing; the run keeps to it. */
const SHUNT_MAX_C = 1000;
/** A linear coefficient never takes a resistance below this share of its value at 25 degC. */
const SHUNT_LEAST_SHARE = 0.01;

/** R_25 (1 + TCR (T - 25)), model.md section 3, within what a shunt can be. */
export function shuntAtTemperatureOhm(document: ScenarioDocument, temperatureC: number): number {
  const { resistanceOhm, tcrPpmPerK } = document.sensing.shunt;
  const riseK = Math.min(temperatureC, SHUNT_MAX_C) - 25;
  return resistanceOhm * Math.max(1 + tcrPpmPerK * 1e-6 * riseK, SHUNT_LEAST_SHARE);
}

/** Times at which the parameters change by the document alone, ascending, without 0. */
export function parameterChangeTimes(document: ScenarioDocument): number[] {
  const times = new Set<number>();
  if (document.load.kind === "motor") for (const entry of document.load.shaft) times.add(entry.timeS);
  for (const fault of document.faults) {
    times.add(fault.atS);
    if (fault.kind === "risingFriction") times.add(fault.atS + fault.overS);
  }
  return [...times].filter((t) => t > 0).sort((a, b) => a - b);
}

/** Two instants closer than this are one (D-01, D-27). */
export const SAME_INSTANT_S = 1e-13;

const isReached = (atS: number, timeS: number) => atS <= timeS + SAME_INSTANT_S;

type Shaft = { viscous: number; constant: number; opposing: number; driving: number; fan: number };

function shaftLoad(document: ScenarioDocument, timeS: number, isLost: boolean): Shaft {
  const shaft: Shaft = { viscous: 0, constant: 0, opposing: 0, driving: 0, fan: 0 };
  if (document.load.kind !== "motor" || isLost) return shaft;
  const n = document.load.gear?.ratio ?? 1;
  const eta = document.load.gear?.efficiency ?? 1;
  let entry: { kind: string; value: number } | undefined;
  for (const candidate of document.load.shaft) if (isReached(candidate.timeS, timeS)) entry = candidate;
  if (!entry) return shaft;
  // D-10: values stand at the gear's output; torque/(n eta), viscous/(n^2 eta), fan/(n^3 eta) at the motor shaft
  if (entry.kind === "constant") shaft.constant = entry.value / (n * eta);
  if (entry.kind === "viscous") shaft.viscous = entry.value / (n * n * eta);
  if (entry.kind === "fan") shaft.fan = entry.value / (n * n * n * eta);
  if (entry.kind === "active") {
    shaft.opposing = entry.value / (n * eta);
    shaft.driving = (entry.value * eta) / n;
  }
  return shaft;
}

type Mutable<T> = { -readonly [K in keyof T]: T[K] };

function applyShuntFactor(p: Mutable<StageParameters>, site: string, leg: "A" | "B" | undefined, factor: number): void {
  if (site === "line") p.lineOhm *= factor;
  else if (site === "supply") p.supplyShuntOhm *= factor;
  else if (site === "return") p.returnShuntOhm *= factor;
  else if (site === "legTop") leg === "B" ? (p.topBOhm *= factor) : (p.topAOhm *= factor);
  else leg === "B" ? (p.bottomBOhm *= factor) : (p.bottomAOhm *= factor);
}

const switchIndex = (leg: "A" | "B", side: "high" | "low") => (leg === "A" ? 0 : 2) + (side === "high" ? 0 : 1);

function applyFault(p: Mutable<StageParameters>, site: string, fault: Fault, timeS: number): void {
  switch (fault.kind) {
    case "stalledRotor":
      p.isLocked = true;
      break;
    case "risingFriction": {
      const rise = fault.coulombNm - p.coulombNm;
      const elapsedS = timeS - fault.atS;
      const isRising = fault.overS > 0 && elapsedS < fault.overS - SAME_INSTANT_S;
      p.coulombNm += isRising ? (rise * Math.max(elapsedS, 0)) / fault.overS : rise;
      p.coulombRateNmPerS = isRising ? rise / fault.overS : 0;
      p.staticNm = Math.max(p.staticNm, p.coulombNm);
      break;
    }
    case "wornBrushes":
      p.windingOhm *= fault.factor;
      break;
    case "shortedTurns":
      p.windingOhm *= fault.resistanceFactor;
      p.inductanceH *= fault.inductanceFactor;
      p.torqueNmPerA *= fault.torqueFactor;
      p.backEmfVPerRadPerS *= fault.torqueFactor;
      break;
    case "openWinding":
      p.isWindingOpen = true;
      break;
    case "switchStuckOpen":
    case "switchShorted": {
      const field = fault.kind === "switchStuckOpen" ? "stuckOpen" : "shorted";
      const flags = [...p[field]] as [boolean, boolean, boolean, boolean];
      flags[switchIndex(fault.leg, fault.side)] = true;
      p[field] = flags;
      break;
    }
    case "shuntOpen": {
      const flags = [...p.openShunt] as [boolean, boolean, boolean];
      flags[site === "legTop" || site === "legBottom" ? (fault.leg === "B" ? 1 : 0) : 2] = true;
      p.openShunt = flags;
      if (site === "line") p.isWindingOpen = true;
      break;
    }
    case "shuntDrifted":
      applyShuntFactor(p, site, fault.leg, fault.factor);
      break;
    case "shuntShorted":
      applyShuntFactor(p, site, fault.leg, 0);
      break;
    case "supplySag":
      p.sourceV = fault.voltageV;
      break;
    default: // lostLoad is in shaftLoad; the amplifier's and reference's faults act in the sensing chain only
      break;
  }
}

/**
 * A bus behind R_s C of a few picoseconds follows the source at once as far as any bridge can tell; as a state it would
 * only cost the other eigenvalues their digits. A blocking source always needs the state.
 */
const LEAST_BUS_TIME_S = 1e-11;

function isBusState({ busCapacitanceF, resistanceOhm, acceptsReturn }: ScenarioDocument["supply"]): boolean {
  return busCapacitanceF > 0 && resistanceOhm > 0 && (!acceptsReturn || busCapacitanceF * resistanceOhm > LEAST_BUS_TIME_S);
}

type LoadConstants = Pick<
  StageParameters,
  "isResistive" | "windingOhm" | "inductanceH" | "backEmfVPerRadPerS" | "torqueNmPerA" | "inertiaKgM2" | "viscousNmPerRadPerS" | "coulombNm" | "staticNm" | "isLocked"
>;

function loadConstants(document: ScenarioDocument, windingC: number): LoadConstants {
  const load = document.load;
  if (load.kind !== "motor") {
    const isResistive = load.kind === "resistive";
    const inductanceH = load.kind === "inductive" ? load.inductanceH : 1;
    return { isResistive, windingOhm: load.resistanceOhm, inductanceH, backEmfVPerRadPerS: 0, torqueNmPerA: 0, inertiaKgM2: 1, viscousNmPerRadPerS: 0, coulombNm: 0, staticNm: 0, isLocked: true };
  }
  const motor = load.motor;
  const loadInertiaKgM2 = (load.gear?.loadInertiaKgM2 ?? 0) / (load.gear?.ratio ?? 1) ** 2;
  return {
    isResistive: false,
    windingOhm: motor.resistanceOhm * (1 + COPPER_PER_KELVIN * (windingC - 20)),
    inductanceH: motor.inductanceH,
    backEmfVPerRadPerS: motor.backEmfVPerRadPerS,
    torqueNmPerA: motor.torqueConstantNmPerA,
    inertiaKgM2: motor.inertiaKgM2 + loadInertiaKgM2,
    viscousNmPerRadPerS: motor.viscousNmPerRadPerS,
    coulombNm: motor.coulombNm,
    staticNm: motor.staticNm,
    isLocked: motor.locked,
  };
}

/**
 * The stage's constants at `timeS` (changes at that instant included).
 * @param windingC winding temperature in degC; @param shunt resistances at temperature, before faults
 */
export function stageParametersAt(document: ScenarioDocument, timeS: number, windingC: number, shunt: ShuntResistances): StageParameters {
  const { supply, bridge, sensing } = document;
  const site = sensing.site;
  const reached = document.faults.filter((fault) => isReached(fault.atS, timeS));
  const constants = loadConstants(document, windingC);
  const shaft = shaftLoad(document, timeS, reached.some((fault) => fault.kind === "lostLoad"));
  const parameters: Mutable<StageParameters> = {
    ...constants,
    sourceV: supply.voltageV,
    sourceOhm: supply.resistanceOhm,
    busF: supply.busCapacitanceF,
    hasBusState: isBusState(supply),
    acceptsReturn: supply.acceptsReturn,
    highOnOhm: bridge.highSide.onResistanceOhm,
    lowOnOhm: bridge.lowSide.onResistanceOhm,
    highDiodeV: bridge.highSide.diodeForwardV,
    lowDiodeV: bridge.lowSide.diodeForwardV,
    highDiodeOhm: bridge.highSide.diodeResistanceOhm,
    lowDiodeOhm: bridge.lowSide.diodeResistanceOhm,
    topAOhm: site === "legTop" ? shunt.aOhm : 0,
    topBOhm: site === "legTop" ? shunt.bOhm : 0,
    bottomAOhm: site === "legBottom" ? shunt.aOhm : 0,
    bottomBOhm: site === "legBottom" ? shunt.bOhm : 0,
    lineOhm: site === "line" ? shunt.aOhm : 0,
    supplyShuntOhm: site === "supply" ? shunt.aOhm : 0,
    returnShuntOhm: site === "return" ? shunt.aOhm : 0,
    viscousNmPerRadPerS: constants.viscousNmPerRadPerS + shaft.viscous,
    coulombRateNmPerS: 0,
    constantNm: shaft.constant,
    activeOpposingNm: shaft.opposing,
    activeDrivingNm: shaft.driving,
    fanNmPerRadPerS2: shaft.fan,
    isWindingOpen: false,
    stuckOpen: [false, false, false, false],
    shorted: [false, false, false, false],
    openShunt: [false, false, false],
  };
  for (const fault of reached) applyFault(parameters, site, fault, timeS);
  return parameters;
}
