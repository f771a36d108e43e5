import type { z } from "zod";
import type { Finding } from "@/lib/result";
import { formatQuantity, formatRange } from "@/lib/units/format";
import { nameOf } from "./names";
import { getAt } from "./paths";
import { LENGTHS, rangeOf, type Range } from "./ranges";
import { FAULT_KINDS, LOAD_KINDS } from "./kinds";

/** Turns zod's issues into findings in the product's words: what stands there, then what may. */

const DEPTH_MAX = 12;
const VALUES_MAX = 5000; // a full document (200 points, 200 specials, 200 shaft entries, 50 faults) has under 2500
const FINDINGS_MAX = 500;

const isObject = (value: unknown): value is Record<string, unknown> => typeof value === "object" && value !== null;

/** A finding for a value too deep or too large to be a scenario (cyclic ones too), found without walking all of it. */
export function tooLarge(root: unknown): Finding | undefined {
  const stack: Array<{ value: unknown; depth: number }> = [{ value: root, depth: 0 }];
  let count = 0;
  while (stack.length > 0) {
    const { value, depth } = stack.pop()!;
    if (!isObject(value)) continue;
    const children = Array.isArray(value) ? value : Object.values(value);
    count += children.length;
    if (depth >= DEPTH_MAX || count > VALUES_MAX) {
      return {
        path: "",
        code: "document.size",
        text: `The document is too large or too deep; a scenario has at most ${VALUES_MAX} values in ${DEPTH_MAX} levels.`,
      };
    }
    for (const child of children) stack.push({ value: child, depth: depth + 1 });
  }
  return undefined;
}

/** The range at a path, with the kind of the fault that it lies in. */
export function rangeAt(path: string, root: unknown): Range | undefined {
  const fault = /^faults\.\d+(?=\.)/.exec(path);
  const kind = fault ? getAt(root, `${fault[0]}.kind`) : undefined;
  return rangeOf(path, typeof kind === "string" ? kind : undefined);
}

/** "enter 0.1 V to 2 kV", with what else the range asks for. */
export function allowed(range: Range): string {
  const whole = range.isWhole ? "a whole number, " : "";
  const below = range.isMaxOpen
    ? `${formatQuantity(range.min, range.unit).text} or more and less than ${formatQuantity(range.max, range.unit).text}`
    : formatRange(range.min, range.max, range.unit);
  return `enter ${whole}${below}`;
}

function shown(value: unknown): string {
  if (typeof value === "string") return JSON.stringify(value.length > 40 ? `${value.slice(0, 40)}…` : value);
  if (Array.isArray(value)) return "a list";
  if (value === null) return "null";
  return typeof value === "object" ? "an object" : String(value);
}

function numberFinding(path: string, value: unknown, range: Range): Finding {
  if (value === undefined) return { path, code: "field.missing", text: `${range.name} is missing; ${allowed(range)}.` };
  if (typeof value !== "number" || !Number.isFinite(value)) {
    return {
      path,
      code: "number.expected",
      text: `${range.name} is ${shown(value)}, not a number; ${allowed(range)}.`,
    };
  }
  // A value outside by a hair must not read as if it were the limit itself
  const short = formatQuantity(value, range.unit, { digits: 6 }).text;
  const isOnLimit = [range.min, range.max].some(
    (limit) => limit !== value && formatQuantity(limit, range.unit, { digits: 6 }).text === short,
  );
  const text = isOnLimit ? formatQuantity(value, range.unit, { digits: 15 }).text : short;
  return { path, code: "number.range", text: `${range.name} is ${text}; ${allowed(range)}.` };
}

const EXPECTED: Readonly<Record<string, string>> = {
  boolean: "true or false",
  string: "text",
  array: "a list",
  object: "an object",
};

function lengthFinding(path: string, value: unknown): Finding {
  const field = path.split(".").at(-1) as keyof typeof LENGTHS;
  const [min, max] = LENGTHS[field];
  const length = typeof value === "string" || Array.isArray(value) ? value.length : 0;
  const what = typeof value === "string" ? "characters" : "entries";
  return { path, code: "length", text: `${nameOf(path)} has ${length} ${what}; ${min} to ${max} are allowed.` };
}

type Issue = z.core.$ZodIssue;

/** The kinds that a load or a fault can have. */
const kindsAt = (path: string): readonly string[] => (path === "load.kind" ? LOAD_KINDS : FAULT_KINDS);

/** Of the branches of a union, the one that the value was meant for: the one whose fields it has. */
function branchIssues(issue: Issue & { code: "invalid_union" }, value: unknown): Issue[] | undefined {
  if (!isObject(value) || issue.errors.length !== 2) return undefined;
  return issue.errors[Object.hasOwn(value, "inOhm") || Object.hasOwn(value, "outOhm") ? 1 : 0] as Issue[];
}

function fromIssue(issue: Issue, root: unknown, base: PropertyKey[]): Finding[] {
  const keys = [...base, ...issue.path];
  const path = keys.map(String).join(".");
  const value = getAt(root, path);
  if (issue.code === "unrecognized_keys") {
    return issue.keys.map((key) => ({
      path: path === "" ? key : `${path}.${key}`,
      code: "field.unknown",
      text: `Field ${JSON.stringify(key.slice(0, 60))} is not part of a scenario here; remove it.`,
    }));
  }
  const range = rangeAt(path, root);
  if (range) return [numberFinding(path, value, range)];
  if (issue.code === "invalid_union") {
    const inner = branchIssues(issue, value);
    if (inner) return inner.flatMap((one) => fromIssue(one, root, keys));
    if (keys.at(-1) === "kind") return [choiceFinding(path, value, kindsAt(path))];
  }
  if (issue.code === "invalid_value") return [choiceFinding(path, value, issue.values.map(String))];
  const expected = issue.code === "invalid_type" ? (EXPECTED[issue.expected] ?? issue.expected) : "an object";
  if (value === undefined)
    return [{ path, code: "field.missing", text: `${nameOf(path)} is missing; ${expected} is expected.` }];
  if (issue.code === "too_big" || issue.code === "too_small") return [lengthFinding(path, value)];
  if (issue.code === "custom") {
    return [
      { path, code: "text.characters", text: `${nameOf(path)} must hold printable characters, and not only spaces.` },
    ];
  }
  return [{ path, code: "type", text: `${nameOf(path)} is ${shown(value)}; ${expected} is expected.` }];
}

function choiceFinding(path: string, value: unknown, options: readonly string[]): Finding {
  const list = options.length > 0 ? `; choose ${options.join(", ")}` : "";
  const name = nameOf(path);
  return value === undefined
    ? { path, code: "field.missing", text: `${name} is missing${list}.` }
    : { path, code: "choice.unknown", text: `${name} is ${shown(value)}${list}.` };
}

/** All findings of a failed parse, one for each path, in the order of the document. */
export function findingsFrom(issues: readonly Issue[], root: unknown): Finding[] {
  const findings: Finding[] = [];
  const seen = new Set<string>();
  for (const finding of issues.flatMap((issue) => fromIssue(issue, root, []))) {
    if (seen.has(finding.path) || findings.length >= FINDINGS_MAX) continue;
    seen.add(finding.path);
    findings.push(finding);
  }
  return findings;
}
