import { isFaultPossible } from "./choices";
import { PERIODS_MAX } from "./ranges";
import type { ScenarioDocument } from "./schema";
import { startOfPart } from "./starts";

/**
 * What must change together. Each mend looks at one rule of rules-*.ts and makes the document keep it again, leaving the
 * field that a person has just changed (`path`) as they set it. The document given is a copy of our own and is changed.
 */
type Mend = (document: ScenarioDocument, path: string, before: ScenarioDocument) => void;

const mendScheme: Mend = ({ pwm, command }, path) => {
  const isCentreAsked = pwm.scheme === "mixedDecay" && path === "pwm.alignment" && pwm.alignment === "centre";
  const isDiodeAsked = pwm.scheme === "lockedAntiphase" && path === "pwm.synchronous" && !pwm.synchronous;
  const isDwellAsked =
    pwm.scheme === "lockedAntiphase" && path === "command.reversal.kind" && command.reversal.kind !== "direct";
  if (isCentreAsked || isDiodeAsked || isDwellAsked) pwm.scheme = "lowSideRecirculation";
  if (pwm.scheme === "mixedDecay") {
    pwm.alignment = "edge";
    pwm.mixedFastShare ??= 0.5;
  } else delete pwm.mixedFastShare;
  if (pwm.scheme === "lockedAntiphase") {
    pwm.synchronous = true;
    command.reversal = { kind: "direct", dwellS: 0 };
  }
  if (path === "command.reversal.kind" && command.reversal.kind !== "direct" && command.reversal.dwellS === 0)
    command.reversal.dwellS = 1e-3;
};

const mendSource: Mend = ({ supply, initial }, path) => {
  const isWithoutPart = supply.busCapacitanceF === 0 || supply.resistanceOhm === 0;
  if (!supply.acceptsReturn && isWithoutPart) {
    if (path === "supply.busCapacitanceF" || path === "supply.resistanceOhm") supply.acceptsReturn = true;
    else {
      if (supply.busCapacitanceF === 0) supply.busCapacitanceF = 1e-3;
      if (supply.resistanceOhm === 0) supply.resistanceOhm = 0.05;
    }
  }
  if (supply.busCapacitanceF === 0 || supply.resistanceOhm === 0) delete initial.busV;
};

const mendLoad: Mend = (document, path) => {
  const { load, initial, sensing } = document;
  if (load.kind !== "motor") initial.speedRadPerS = 0;
  else if (load.motor.locked && initial.speedRadPerS !== 0) {
    if (path === "initial.speedRadPerS") load.motor.locked = false;
    else initial.speedRadPerS = 0;
  }
  if (load.kind === "resistive") {
    initial.currentA = 0;
    sensing.shunt.inductanceH = 0;
  }
};

/** K_e equals K_t, and static friction the Coulomb one, for as long as a person leaves them equal. */
const mendConstants: Mend = ({ load }, path, before) => {
  if (load.kind !== "motor" || before.load.kind !== "motor") return;
  const { motor } = load;
  const old = before.load.motor;
  if (path === "load.motor.torqueConstantNmPerA" && old.backEmfVPerRadPerS === old.torqueConstantNmPerA)
    motor.backEmfVPerRadPerS = motor.torqueConstantNmPerA;
  if (path === "load.motor.coulombNm" && old.staticNm === old.coulombNm) motor.staticNm = motor.coulombNm;
};

const isLegSite = (document: ScenarioDocument) =>
  document.sensing.site === "legTop" || document.sensing.site === "legBottom";

/** D-21: the arrangement follows the site, unipolar channels suit legs, bipolar ones a single shunt. */
const mendArrangement: Mend = (document, path, before) => {
  const { amplifier } = document.sensing;
  if (isLegSite(document)) {
    if (amplifier.arrangement === "bipolarMidscale") amplifier.arrangement = "combinedMidscale";
    if (path === "sensing.site" && !isLegSite(before)) amplifier.response = "unipolar";
  } else if (amplifier.arrangement !== "singleEnded") amplifier.arrangement = "bipolarMidscale";
  if (amplifier.arrangement === "bipolarMidscale" && amplifier.response === "unipolar") {
    if (path === "sensing.amplifier.response") amplifier.arrangement = "singleEnded";
    else amplifier.response = "bipolar";
  }
};

const mendReference: Mend = (document, path) => {
  const { sensing } = document;
  const { amplifier } = sensing;
  const isMidscale = amplifier.arrangement === "combinedMidscale" || amplifier.arrangement === "bipolarMidscale";
  if (isMidscale && !sensing.reference) {
    if (path === "sensing.reference") amplifier.arrangement = isLegSite(document) ? "differencePair" : "singleEnded";
    else sensing.reference = startOfPart("sensing.reference", document) as NonNullable<typeof sensing.reference>;
  }
  if (isLegSite(document) || amplifier.arrangement !== "singleEnded" || !sensing.reference) return;
  if (path.startsWith("sensing.reference"))
    [amplifier.arrangement, amplifier.response] = ["bipolarMidscale", "bipolar"];
  else delete sensing.reference;
};

const mendFilter: Mend = ({ sensing }) => {
  const { filter, amplifier } = sensing;
  if (!filter) return;
  if (!("fixed" in amplifier.gain)) delete filter.resistanceOhm;
  else if (filter.capacitanceF > 0) filter.resistanceOhm ??= 1000;
};

const mendRamp: Mend = ({ sensing, bridge }, path) => {
  if (sensing.site === "line" || bridge.commutationS > 0 || sensing.shunt.inductanceH === 0) return;
  if (path === "bridge.commutationS") sensing.shunt.inductanceH = 0;
  else bridge.commutationS = 5e-8;
};

const LEG_FAULTS = ["shuntOpen", "shuntDrifted", "shuntShorted", "amplifierOffsetShift", "amplifierStuckOutput"];

const mendFaults: Mend = (document) => {
  document.faults = document.faults.filter((fault) => isFaultPossible(fault.kind, document));
  for (const fault of document.faults as Array<{ kind: string; leg?: "A" | "B" }>) {
    if (!LEG_FAULTS.includes(fault.kind)) continue;
    if (isLegSite(document)) fault.leg ??= "A";
    else delete fault.leg;
  }
  const { highSide, lowSide } = document.bridge;
  const isShorted = document.faults.some((fault) => fault.kind === "switchShorted");
  if (isShorted && highSide.onResistanceOhm + lowSide.onResistanceOhm + document.supply.resistanceOhm === 0)
    lowSide.onResistanceOhm = 0.01;
};

const mendRun: Mend = ({ run, pwm, sensing }, path) => {
  if (path === "pwm.frequencyHz" && run.durationS * pwm.frequencyHz > PERIODS_MAX)
    run.durationS = PERIODS_MAX / pwm.frequencyHz;
  if (run.window && run.window.toS > run.durationS && !path.startsWith("run.window")) delete run.window;
  const spacingS = 1 / (pwm.frequencyHz * sensing.converter.perPeriod);
  if (path !== "sensing.converter.apertureS" && sensing.converter.apertureS > spacingS)
    sensing.converter.apertureS = spacingS;
};

const MENDS: readonly Mend[] = [
  mendScheme,
  mendSource,
  mendLoad,
  mendConstants,
  mendArrangement,
  mendReference,
  mendFilter,
  mendRamp,
  mendFaults,
  mendRun,
];

/** The document after `path` was changed, with everything else that this change asks for. */
export function mended(changed: ScenarioDocument, path: string, before: ScenarioDocument): ScenarioDocument {
  const document = structuredClone(changed);
  for (const mend of MENDS) mend(document, path, before);
  return document;
}
