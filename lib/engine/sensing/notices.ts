import type { ScenarioDocument } from "../../scenario/schema";
import { formatQuantity } from "../../units/format";
import type { Conversion, Notice, Simulation } from "../results";
import type { Excess, RunMonitor } from "./monitor";

const text = (value: number, unit: string) => formatQuantity(value, unit).text;
const percent = (share: number) => `${Number((100 * share).toPrecision(2))} %`;

/** Bus voltages above this are shown with the high-voltage cautions: the usual limit of extra-low voltage, common practice. */
const LOW_VOLTAGE_LIMIT_V = 60;

/**
 * What the run has to say, faults first: what is wrong, where, and what to change (look.md section 11).
 * Codes are stable; `path` names the input, `timeS` the first instant.
 */
export function noticesOf(document: ScenarioDocument, simulation: Simulation, monitor: RunMonitor): Notice[] {
  const notices = [
    ...sampleNotices(document, simulation),
    ...outputNotices(simulation, monitor),
    ...commonModeNotices(document, monitor),
    ...stageNotices(document, simulation, monitor),
    ...documentNotices(document),
  ];
  const rank = { fault: 0, caution: 1, note: 2 };
  return notices.sort((a, b) => rank[a.severity] - rank[b.severity]);
}

/** Largest error of a conversion that passes without remark: 2 % of full scale or two codes, whichever is more. */
export function sampleLimitA(document: ScenarioDocument): number {
  const { amplifier, converter, shunt, reference } = document.sensing;
  const gain = "inOhm" in amplifier.gain ? amplifier.gain.outOhm / amplifier.gain.inOhm : amplifier.gain.fixed;
  const isMidscale = amplifier.arrangement === "combinedMidscale" || amplifier.arrangement === "bipolarMidscale";
  const spanV = isMidscale ? Math.max(amplifier.outputMaxV - (reference?.voltageV ?? 0), 0) : amplifier.outputMaxV - Math.max(amplifier.outputMinV, 0);
  const codeV = (converter.input === "unipolar" ? 1 : 2) * (converter.fullScaleV / 2 ** converter.bits);
  return Math.max(0.02 * spanV, 2 * codeV) / (gain * shunt.resistanceOhm);
}

function sampleNotices(document: ScenarioDocument, { samples, figures }: Simulation): Notice[] {
  const limitA = sampleLimitA(document);
  const misses = samples.filter((c) => Math.abs(c.reconstructedA - c.trueA) > limitA);
  if (misses.length === 0) return [];
  const worst = misses.reduce((a, b) => (Math.abs(b.reconstructedA - b.trueA) > Math.abs(a.reconstructedA - a.trueA) ? b : a));
  const errorA = worst.reconstructedA - worst.trueA;
  return [
    {
      code: "samplesMiss",
      severity: "fault",
      title: `${misses.length} of ${samples.length} samples miss the current`,
      text: `The worst reads ${text(worst.reconstructedA, "A")} while ${text(worst.trueA, "A")} flows (${text(errorA, "A")}; limit ${text(limitA, "A")}). ${missReason(document, worst)} ${figures.clippedShare > 0 ? "Part of the window is clipped." : ""}`.trim(),
      timeS: worst.timeS,
      path: "sensing.converter.phase",
    },
  ];
}

function missReason(document: ScenarioDocument, worst: Conversion): string {
  const { site, amplifier } = document.sensing;
  if (site === "supply" || site === "return") return "This shunt carries the bridge current, which is the motor current only while driving.";
  if (amplifier.response === "unipolar" && site === "line" && worst.trueA < 0) return "A unipolar channel does not see reverse current.";
  const reading = Math.abs(worst.reconstructedA);
  if (reading < 0.2 * Math.abs(worst.trueA)) return "At that instant no shunt carries the current upwards: it recirculates or returns to the supply. Move the sample instant into the drive interval.";
  return "The output has not settled at that instant, or is limited. Move the sample instant, or make the filter faster.";
}

function outputNotices(simulation: Simulation, monitor: RunMonitor): Notice[] {
  const notices: Notice[] = [];
  if (monitor.clippedFirstS !== null) {
    const share = monitor.clippedS / monitor.ranS;
    const isCeiling = simulation.events.find((event) => event.kind === "clipStarts")?.detail !== "floor";
    notices.push({
      code: "outputClips",
      severity: isCeiling ? "fault" : "caution",
      title: `An output rests at its ${isCeiling ? "ceiling" : "floor"} for ${percent(share)} of the run`,
      text: isCeiling
        ? `Largest motor current ${text(monitor.currentMaxA, "A")}. Lower the gain or the shunt, or raise the output limit.`
        : "Below the floor the reading says nothing about the current. A midscale reference keeps both directions inside the span.",
      timeS: monitor.clippedFirstS,
      path: isCeiling ? "sensing.amplifier.gain" : "sensing.amplifier.outputMinV",
    });
  }
  if (monitor.bothShuntsS !== null) {
    notices.push({
      code: "pairReadsTwice",
      severity: "caution",
      title: "The pair reads twice the current while both shunts carry it",
      text: "Bipolar channels show the current in both legs during this recirculation, and their difference adds them. Unipolar channels make the pair track the motor current.",
      timeS: monitor.bothShuntsS,
      path: "sensing.amplifier.response",
    });
  }
  return notices;
}

function commonModeNotices(document: ScenarioDocument, monitor: RunMonitor): Notice[] {
  const { amplifier } = document.sensing;
  const make = (excess: Excess, limitV: number, path: string): Notice => {
    const isAbsolute = excess.extreme > amplifier.commonModeAbsMaxV;
    return {
      code: isAbsolute ? "commonModeAbsolute" : "commonModeRange",
      severity: isAbsolute ? "fault" : "caution",
      title: `Common mode reaches ${text(excess.extreme, "V")}`,
      text: isAbsolute
        ? `The amplifier's absolute maximum is ${text(amplifier.commonModeAbsMaxV, "V")}: the part would be damaged. Choose a part with a higher rating, another site, or a floating stage.`
        : `The amplifier's operating range ends at ${text(limitV, "V")}; its readings there are not covered by its data. Choose another site or a part with a wider range.`,
      timeS: excess.firstS,
      path,
    };
  };
  const notices: Notice[] = [];
  if (monitor.commonModeHigh) notices.push(make(monitor.commonModeHigh, amplifier.commonModeMaxV, "sensing.amplifier.commonModeMaxV"));
  if (monitor.commonModeLow) notices.push(make(monitor.commonModeLow, amplifier.commonModeMinV, "sensing.amplifier.commonModeMinV"));
  return notices;
}

function stageNotices(document: ScenarioDocument, simulation: Simulation, monitor: RunMonitor): Notice[] {
  const notices: Notice[] = [];
  const { figures } = simulation;
  if (simulation.status !== "reached-end") notices.push({ code: "runStopped", severity: "fault", title: "The run stopped", text: simulation.statusText });
  if (monitor.shootThrough) {
    notices.push({ code: "shootThrough", severity: "fault", title: "Both switches of a leg conduct", text: "The supply is shorted through the leg; only on-resistance, shunts and supply resistance limit the current. Dangerous on a real bridge: protect the supply before any such trial.", timeS: monitor.shootThrough.firstS, path: "faults" });
  }
  if (monitor.busCollapsed) {
    notices.push({ code: "busCollapsed", severity: "fault", title: `The bus falls to ${text(monitor.busCollapsed.extreme, "V")}`, text: "Below one diode drop under ground the free-wheeling diodes would hold it; the numbers are kept but lie outside the model. Lower the supply resistance or the current.", timeS: monitor.busCollapsed.firstS, path: "supply.resistanceOhm" });
  }
  if (monitor.diodeWouldShare) {
    notices.push({ code: "diodeWouldShare", severity: "caution", title: `A body diode would share ${text(monitor.diodeWouldShare.extreme, "A")}`, text: "The channel's drop exceeds its diode's forward voltage; the model keeps all of the current in the channel, so its loss is overstated.", timeS: monitor.diodeWouldShare.firstS, path: "bridge.lowSide.onResistanceOhm" });
  }
  const risen = monitor.busMaxV / document.supply.voltageV;
  if (!document.supply.acceptsReturn && risen > 1.05) {
    notices.push({ code: "busPumps", severity: "caution", title: `The bus is pumped up to ${text(monitor.busMaxV, "V")}`, text: "The source takes no current back, so the motor's energy charges the bus capacitor. Check the ratings of switches, capacitor and amplifier; a larger capacitor or a brake path lowers the peak.", path: "supply.busCapacitanceF" });
  }
  if (figures.energyResidualShare !== null && figures.energyResidualShare > 1e-6) {
    notices.push({ code: "energyResidual", severity: "caution", title: `Energy balance closes to ${percent(figures.energyResidualShare)} only`, text: "Energy in and out of the window should agree to a millionth. An interruption of the current (open winding or shunt) takes its energy out of the model." });
  }
  return notices;
}

function documentNotices(document: ScenarioDocument): Notice[] {
  const { pwm, bridge, supply, load } = document;
  const notices: Notice[] = [];
  if (bridge.deadTimeS >= 0.45 / pwm.frequencyHz) {
    notices.push({ code: "deadTimeLong", severity: "caution", title: "Dead time fills the PWM period", text: `${text(bridge.deadTimeS, "s")} of a period of ${text(1 / pwm.frequencyHz, "s")}: pulses are swallowed and the diodes set the current.`, path: "bridge.deadTimeS" });
  }
  if (pwm.scheme === "fastDecay" && pwm.synchronous) {
    notices.push({ code: "synchronousFastDecay", severity: "note", title: "Synchronous fast decay drives both ways", text: "It is the locked antiphase pattern with D = d: below a duty of 50 % the mean voltage is against the command.", path: "pwm.synchronous" });
  }
  if (load.kind === "motor") {
    const { torqueConstantNmPerA: kt, backEmfVPerRadPerS: ke } = load.motor;
    if (Math.abs(kt - ke) > 0.02 * Math.max(kt, ke)) notices.push({ code: "constantsDiffer", severity: "note", title: "Torque and back-EMF constants differ", text: "In SI units they are one number for a real motor; the difference is booked as a loss of the conversion.", path: "load.motor.backEmfVPerRadPerS" });
    if (load.motor.locked) notices.push({ code: "stalledMotor", severity: "caution", title: "The rotor is locked", text: "A stalled motor heats within seconds and can move suddenly when freed. Limit the time on the bench and keep clear of the mechanism." });
  }
  if (supply.voltageV > LOW_VOLTAGE_LIMIT_V) {
    notices.push({ code: "highVoltage", severity: "caution", title: `High voltage: ${text(supply.voltageV, "V")} bus`, text: "Capacitors stay charged after switch-off, and the sensing side may be live. Work on it only as a qualified person, isolated and discharged, under the local electrical code.", path: "supply.voltageV" });
  }
  return notices;
}
