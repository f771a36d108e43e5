import type { Finding } from "@/lib/result";
import { formatQuantity } from "@/lib/units/format";
import type { Reader } from "./reader";

/** Rules between the fields of supply, PWM, command, load and initial state. */

const broken = (path: string, name: string, text: string): Finding => ({ path, code: `rule.${name}`, text });

/** D-09, D-45. */
function blockingSource(read: Reader): Finding[] {
  if (read.flag("supply.acceptsReturn", true) !== false) return [];
  const findings: Finding[] = [];
  if (read.number("supply.busCapacitanceF") === 0) {
    findings.push(
      broken(
        "supply.busCapacitanceF",
        "blockingSource",
        "A supply that takes no current back needs a bus capacitor; enter a capacitance above 0, at most 1 F.",
      ),
    );
  }
  if (read.number("supply.resistanceOhm") === 0) {
    findings.push(
      broken(
        "supply.resistanceOhm",
        "blockingSource",
        "A supply that takes no current back needs a resistance; enter a resistance above 0, at most 10 Ω.",
      ),
    );
  }
  return findings;
}

/** D-45: without both a capacitor and a source resistance the bus has no voltage of its own to start from. */
function stiffBus(read: Reader): Finding[] {
  const [busV, sourceV] = [read.number("initial.busV"), read.number("supply.voltageV")];
  const [capacitanceF, resistanceOhm] = [read.number("supply.busCapacitanceF"), read.number("supply.resistanceOhm")];
  if (busV === undefined || sourceV === undefined || capacitanceF === undefined || resistanceOhm === undefined)
    return [];
  if ((capacitanceF > 0 && resistanceOhm > 0) || busV === sourceV) return [];
  const text = `The bus is held by the supply, so it starts at ${formatQuantity(sourceV, "V", { digits: 6 }).text}; leave the initial bus voltage out, or give bus capacitance and supply resistance.`;
  return [broken("initial.busV", "stiffBus", text)];
}

/** D-05, D-28. */
function scheme(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const chosen = read.word("pwm.scheme");
  if (chosen === "mixedDecay") {
    if (read.word("pwm.alignment") === "centre")
      findings.push(broken("pwm.alignment", "mixedDecayEdge", "Mixed decay is edge-aligned only; choose edge."));
    if (!read.has("pwm.mixedFastShare"))
      findings.push(
        broken(
          "pwm.mixedFastShare",
          "mixedFastShare",
          "Mixed decay needs the fast share of the off-time; enter 0 to 1.",
        ),
      );
  } else if (chosen !== undefined && read.has("pwm.mixedFastShare")) {
    findings.push(
      broken("pwm.mixedFastShare", "mixedFastShare", "The fast share belongs to mixed decay only; leave it out."),
    );
  }
  if (chosen === "lockedAntiphase") {
    if (read.flag("pwm.synchronous", true) === false)
      findings.push(
        broken(
          "pwm.synchronous",
          "antiphaseSynchronous",
          "Locked antiphase has no recirculating switch to leave off; set synchronous to true.",
        ),
      );
    const reversal = read.word("command.reversal.kind");
    if (reversal !== undefined && reversal !== "direct")
      findings.push(
        broken(
          "command.reversal.kind",
          "antiphaseReversal",
          "Locked antiphase passes through zero by itself; choose direct.",
        ),
      );
  }
  return findings;
}

/** D-17, D-29, and loads that have no shaft. */
function loadState(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const kind = read.word("load.kind");
  const speed = read.number("initial.speedRadPerS");
  if (kind === "motor" && read.flag("load.motor.locked", false) === true && speed !== undefined && speed !== 0) {
    findings.push(broken("initial.speedRadPerS", "lockedRotor", "A locked rotor stands still; enter 0 rad/s."));
  }
  if ((kind === "inductive" || kind === "resistive") && speed !== undefined && speed !== 0) {
    findings.push(broken("initial.speedRadPerS", "noShaft", "This load has no shaft; enter 0 rad/s."));
  }
  if (kind !== "resistive") return findings;
  const [inductanceH, currentA] = [read.number("sensing.shunt.inductanceH"), read.number("initial.currentA")];
  if (inductanceH !== undefined && inductanceH !== 0)
    findings.push(
      broken(
        "sensing.shunt.inductanceH",
        "resistiveLoad",
        "A resistive load's current jumps, which a shunt with inductance cannot show; enter 0 H.",
      ),
    );
  if (currentA !== undefined && currentA !== 0)
    findings.push(
      broken(
        "initial.currentA",
        "resistiveLoad",
        "A resistive load has no current of its own to start from; enter 0 A.",
      ),
    );
  return findings;
}

/** D-39: constant, viscous and fan loads are magnitudes. */
function shaftValues(read: Reader): Finding[] {
  const findings: Finding[] = [];
  for (let index = 0; index < read.count("load.shaft"); index += 1) {
    const [kind, value] = [read.word(`load.shaft.${index}.kind`), read.number(`load.shaft.${index}.value`)];
    if (value === undefined || value >= 0 || !["constant", "viscous", "fan"].includes(kind ?? "")) continue;
    findings.push(
      broken(
        `load.shaft.${index}.value`,
        "shaftSign",
        `A ${kind} shaft load is a magnitude; enter 0 or more, at most 1 000 000.`,
      ),
    );
  }
  return findings;
}

export const DRIVE_RULES = [blockingSource, stiffBus, scheme, loadState, shaftValues];
