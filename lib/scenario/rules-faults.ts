import type { Finding } from "@/lib/result";
import type { Reader } from "./reader";

/** Rules between a fault and the rest of the document (D-35, D-36). */

const broken = (path: string, name: string, text: string): Finding => ({ path, code: `rule.${name}`, text });

const SENSING_FAULTS = ["shuntOpen", "shuntDrifted", "shuntShorted", "amplifierOffsetShift", "amplifierStuckOutput"];
const MOTOR_FAULTS = ["stalledRotor", "lostLoad", "risingFriction", "wornBrushes"];

function faultPlace(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const [site, load] = [read.word("sensing.site"), read.word("load.kind")];
  for (let index = 0; index < read.count("faults"); index += 1) {
    const base = `faults.${index}`;
    const kind = read.word(`${base}.kind`) ?? "";
    if (SENSING_FAULTS.includes(kind) && site !== undefined) {
      const hasLegs = site === "legTop" || site === "legBottom";
      const hasLeg = read.has(`${base}.leg`);
      if (hasLegs && !hasLeg)
        findings.push(broken(`${base}.leg`, "faultLeg", "There is a shunt in each leg; choose A or B."));
      if (!hasLegs && hasLeg && ["line", "supply", "return"].includes(site))
        findings.push(broken(`${base}.leg`, "faultLeg", "There is one shunt only; leave the leg out."));
    }
    if (load !== undefined && load !== "motor" && MOTOR_FAULTS.includes(kind))
      findings.push(
        broken(`${base}.kind`, "faultLoad", "This fault needs a motor as the load; remove it or choose a motor."),
      );
    if (load === "resistive" && kind === "shortedTurns")
      findings.push(
        broken(`${base}.kind`, "faultLoad", "A resistive load has no turns; remove this fault or choose another load."),
      );
    if (kind === "referenceDrift" && !read.has("sensing.reference"))
      findings.push(
        broken(
          `${base}.kind`,
          "faultReference",
          "There is no reference to drift; remove this fault or give a reference.",
        ),
      );
  }
  return findings;
}

/** D-36: something must limit the current of a leg whose two switches are on. */
function shootThrough(read: Reader): Finding[] {
  const findings: Finding[] = [];
  const parts = ["bridge.highSide.onResistanceOhm", "bridge.lowSide.onResistanceOhm", "supply.resistanceOhm"].map(
    (path) => read.number(path),
  );
  if (parts.some((part) => part === undefined) || parts.some((part) => part! > 0)) return findings;
  const kinds = Array.from({ length: read.count("faults") }, (_, index) => read.word(`faults.${index}.kind`));
  const hasShunt = read.word("sensing.site") !== "line" && !kinds.includes("shuntShorted");
  kinds.forEach((kind, index) => {
    if (kind !== "switchShorted" || hasShunt) return;
    findings.push(
      broken(
        `faults.${index}.kind`,
        "shootThrough",
        "Nothing would limit the current through this leg; give the switches or the supply a resistance above 0.",
      ),
    );
  });
  return findings;
}

export const FAULT_RULES = [faultPlace, shootThrough];
