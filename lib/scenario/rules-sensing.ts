import type { Finding } from "@/lib/result";
import { formatQuantity } from "@/lib/units/format";
import type { Reader } from "./reader";

/** Rules between the fields of the sensing chain. */

const broken = (path: string, name: string, text: string): Finding => ({ path, code: `rule.${name}`, text });
const isLeg = (site: string | undefined) => site === "legTop" || site === "legBottom";

const LEG_ARRANGEMENTS = ["singleEnded", "differencePair", "combinedMidscale"];
const SINGLE_ARRANGEMENTS = ["singleEnded", "bipolarMidscale"];
const KNOWN_SITES = ["legTop", "legBottom", "line", "supply", "return"];
const KNOWN_ARRANGEMENTS = [...LEG_ARRANGEMENTS, "bipolarMidscale"];

/** D-21: which arrangement a site can have, and what it needs. */
function arrangement(read: Reader): Finding[] {
  const [site, chosen] = [read.word("sensing.site"), read.word("sensing.amplifier.arrangement")];
  if (!KNOWN_SITES.includes(site ?? "") || !KNOWN_ARRANGEMENTS.includes(chosen ?? "")) return [];
  const findings: Finding[] = [];
  const possible = isLeg(site) ? LEG_ARRANGEMENTS : SINGLE_ARRANGEMENTS;
  if (!possible.includes(chosen!)) {
    const shunts = isLeg(site) ? "Shunts in the legs" : "A single shunt";
    findings.push(
      broken(
        "sensing.amplifier.arrangement",
        "arrangement",
        `${shunts} cannot be read as ${chosen}; choose ${possible.join(", ")}.`,
      ),
    );
  }
  if (chosen === "bipolarMidscale" && read.word("sensing.amplifier.response") === "unipolar") {
    findings.push(
      broken(
        "sensing.amplifier.response",
        "midscaleResponse",
        "A bipolar channel around midscale reads both signs; choose bipolar.",
      ),
    );
  }
  const isMidscale = chosen === "combinedMidscale" || chosen === "bipolarMidscale";
  if (isMidscale && !read.has("sensing.reference")) {
    findings.push(
      broken(
        "sensing.reference",
        "referenceNeeded",
        "A midscale output needs a reference; give its voltage, −50 V to 50 V, tolerance and temperature coefficient.",
      ),
    );
  }
  // The legs' combined output is computed whenever there is a reference; a single shunt read from ground has no use for one.
  if (!isLeg(site) && chosen === "singleEnded" && read.has("sensing.reference")) {
    findings.push(
      broken(
        "sensing.reference",
        "referenceUnused",
        "A single shunt read from ground up has no reference; leave it out, or choose bipolarMidscale.",
      ),
    );
  }
  return findings;
}

/** A pair of limits of which the first must be the lower one. */
function ordered(read: Reader, lowPath: string, highPath: string, what: string, mayBeEqual: boolean): Finding[] {
  const [low, high] = [read.number(lowPath), read.number(highPath)];
  if (low === undefined || high === undefined || low < high || (mayBeEqual && low === high)) return [];
  const [lowText, highText] = [low, high].map((value) => formatQuantity(value, "V", { digits: 6 }).text);
  return [
    broken(lowPath, "order", `${what} is ${lowText}; enter ${mayBeEqual ? "at most" : "less than"} ${highText}.`),
  ];
}

const limits = (read: Reader): Finding[] => [
  ...ordered(read, "sensing.amplifier.outputMinV", "sensing.amplifier.outputMaxV", "Lowest output", false),
  ...ordered(read, "sensing.amplifier.commonModeMinV", "sensing.amplifier.commonModeMaxV", "Lowest common mode", false),
  ...ordered(
    read,
    "sensing.amplifier.commonModeMaxV",
    "sensing.amplifier.commonModeAbsMaxV",
    "Highest common mode",
    true,
  ),
];

/** A current-output amplifier filters at its output node, a fixed-gain one needs a resistor of its own. */
function filter(read: Reader): Finding[] {
  if (!read.has("sensing.filter")) return [];
  const path = "sensing.filter.resistanceOhm";
  const [resistanceOhm, capacitanceF] = [read.number(path), read.number("sensing.filter.capacitanceF")];
  const outOhm = read.number("sensing.amplifier.gain.outOhm");
  if (read.has("sensing.amplifier.gain.fixed")) {
    const isNeeded = capacitanceF !== undefined && capacitanceF > 0 && !read.has(path);
    return isNeeded
      ? [
          broken(
            path,
            "filterResistance",
            "The filter of a fixed-gain amplifier needs a resistor; enter 1 mΩ to 10 MΩ.",
          ),
        ]
      : [];
  }
  if (outOhm === undefined || resistanceOhm === undefined || resistanceOhm === outOhm) return [];
  const text = `With gain resistors the filter's resistance is the output resistor, ${formatQuantity(outOhm, "Ω", { digits: 6 }).text}; leave it out.`;
  return [broken(path, "filterResistance", text)];
}

/** D-20: without a ramp the current of an inductive shunt would jump. A shunt in the motor line carries the smooth motor current. */
function impulse(read: Reader): Finding[] {
  const [inductanceH, commutationS] = [read.number("sensing.shunt.inductanceH"), read.number("bridge.commutationS")];
  const site = read.word("sensing.site");
  if (
    !KNOWN_SITES.includes(site ?? "") ||
    site === "line" ||
    commutationS !== 0 ||
    inductanceH === undefined ||
    inductanceH <= 0
  )
    return [];
  return [
    broken(
      "bridge.commutationS",
      "impulse",
      "A shunt with inductance needs a commutation time, or its voltage is an impulse; enter 1 ps to 10 µs, or set the shunt's inductance to 0 H.",
    ),
  ];
}

/** One converter takes its conversions one after the other. */
function aperture(read: Reader): Finding[] {
  const [apertureS, frequencyHz, perPeriod] = [
    read.number("sensing.converter.apertureS"),
    read.number("pwm.frequencyHz"),
    read.number("sensing.converter.perPeriod"),
  ];
  if (
    apertureS === undefined ||
    frequencyHz === undefined ||
    perPeriod === undefined ||
    frequencyHz <= 0 ||
    perPeriod <= 0
  )
    return [];
  const spacingS = 1 / (frequencyHz * perPeriod);
  if (apertureS <= spacingS * (1 + 1e-9)) return [];
  const [given, longest] = [apertureS, spacingS].map((value) => formatQuantity(value, "s", { digits: 6 }).text);
  return [
    broken(
      "sensing.converter.apertureS",
      "aperture",
      `The aperture is ${given}, but conversions come every ${longest}; enter 0 s to ${longest}.`,
    ),
  ];
}

export const SENSING_RULES = [arrangement, limits, filter, impulse, aperture];
