import type { Finding } from "@/lib/result";
import { getAt } from "./paths";
import { RANGES } from "./ranges";
import { readerOf, type Reader } from "./reader";
import { DRIVE_RULES } from "./rules-drive";
import { FAULT_RULES } from "./rules-faults";
import { SENSING_RULES } from "./rules-sensing";
import { TIME_RULES } from "./rules-times";
import { formatQuantity } from "@/lib/units/format";

/** A rule between fields: every place where a document breaks it. `code` is `rule.` and the rule's name. */
export type Rule = (read: Reader) => Finding[];

/** Zero or more than the floor: a value in between is a mistyped one and would cost the solver its digits. */
function belowFloor(root: unknown): Finding[] {
  const findings: Finding[] = [];
  for (const [path, range] of Object.entries(RANGES)) {
    const value = range.floor === undefined ? undefined : getAt(root, path);
    if (typeof value !== "number" || !(value > 0) || value >= range.floor!) continue;
    const { name, unit, floor, max } = range;
    const text = `${name} is ${formatQuantity(value, unit).text}; enter 0, or ${formatQuantity(floor!, unit).text} to ${formatQuantity(max, unit).text}.`;
    findings.push({ path, code: "number.range", text });
  }
  return findings;
}

/** Every rule that the value breaks, one finding for each path. */
export function brokenRules(root: unknown): Finding[] {
  const read = readerOf(root);
  const findings = [...DRIVE_RULES, ...TIME_RULES, ...SENSING_RULES, ...FAULT_RULES].flatMap((rule) => rule(read));
  return [...belowFloor(root), ...findings];
}
