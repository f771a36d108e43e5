import { formatQuantity } from "@/lib/units/format";
import { choiceLabel } from "./choices";
import { rangeAt } from "./findings";
import { inputAt, resolveInput } from "./inputs";
import { nameOf } from "./names";
import type { ScenarioDocument } from "./schema";

export type Difference = {
  path: string;
  /** Where, in words: "Shunt resistance", "Command point 2, duty". */
  label: string;
  /** As it reads; "none" where there was nothing. */
  before: string;
  after: string;
  /** One line: "Shunt resistance 4 mΩ to 10 mΩ", "Gear added". */
  text: string;
};

const NONE = "none";
type Tree = Record<string, unknown>;
const isTree = (value: unknown): value is Tree => typeof value === "object" && value !== null;

/** Name of a field with its row: "Command point 2, duty". */
export function labelOf(path: string, document: ScenarioDocument): string {
  const match = /^(.*?)\.(\d+)(?:\.(.+))?$/.exec(path);
  if (!match) return nameOf(path);
  const row = `${nameOf(`${match[1]}.*`)} ${Number(match[2]) + 1}`;
  if (match[3] === undefined) return row;
  const label = (resolveInput(path, document) ?? inputAt(path))?.label ?? nameOf(path);
  return `${row}, ${label.toLowerCase()}`;
}

/** A value as it reads in the product: with unit, or in the words of its choice. */
export function valueText(path: string, value: unknown, document: ScenarioDocument): string {
  if (value === undefined) return NONE;
  if (typeof value === "boolean") return value ? "on" : "off";
  if (typeof value === "string") return choiceLabel(path, value);
  if (typeof value === "number") {
    const input = resolveInput(path, document) ?? inputAt(path);
    const unit = input?.kind === "quantity" ? input.unit : (rangeAt(path, document)?.unit ?? "");
    return formatQuantity(value, unit, { digits: 6 }).text;
  }
  return Array.isArray(value) ? `${value.length} entries` : "present";
}

function difference(
  path: string,
  before: unknown,
  after: unknown,
  from: ScenarioDocument,
  to: ScenarioDocument,
): Difference {
  const label = labelOf(path, after === undefined ? from : to);
  const texts = { before: valueText(path, before, from), after: valueText(path, after, to) };
  if (before === undefined && isTree(after)) return { path, label, ...texts, text: `${label} added` };
  if (after === undefined && isTree(before)) return { path, label, ...texts, text: `${label} removed` };
  return { path, label, ...texts, text: `${label} ${texts.before} to ${texts.after}` };
}

function walk(
  before: unknown,
  after: unknown,
  path: string,
  from: ScenarioDocument,
  to: ScenarioDocument,
  found: Difference[],
): void {
  if (Object.is(before, after) || before === after) return;
  if (!isTree(before) || !isTree(after) || Array.isArray(before) !== Array.isArray(after)) {
    found.push(difference(path, before, after, from, to));
    return;
  }
  for (const key of new Set([...Object.keys(before), ...Object.keys(after)])) {
    walk(before[key], after[key], path === "" ? key : `${path}.${key}`, from, to, found);
  }
}

/** Every field in which two documents differ, in the order of the document. Rows of lists are compared by their number. */
export function diffDocuments(before: ScenarioDocument, after: ScenarioDocument): Difference[] {
  const found: Difference[] = [];
  walk(before, after, "", before, after, found);
  return found;
}
