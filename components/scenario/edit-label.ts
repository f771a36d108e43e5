import { choiceLabel, inputValue, resolveInput, type Input } from "@/lib/scenario/inputs";
import type { ScenarioDocument } from "@/lib/scenario/schema";
import { formatQuantity } from "@/lib/units/format";

const lower = (text: string): string => (/^[A-Z]{2}/.test(text) ? text : text.charAt(0).toLowerCase() + text.slice(1));

/** The value of an input in words: "10 mΩ", "Fast decay", "on". */
export function valueWords(input: Input, document: ScenarioDocument): string {
  const value = inputValue(input, document);
  if (input.kind === "quantity")
    return typeof value === "number" ? formatQuantity(value, input.unit, { digits: 6 }).text : "left out";
  if (input.kind === "choice")
    return typeof value === "string" ? choiceLabel(input.path, value).toLowerCase() : "left out";
  return value === true ? "on" : "off";
}

/** Words of a step of the history: "sample instant 3 to 25 %", the unit once if both have it. */
export function editLabel(path: string, before: ScenarioDocument, after: ScenarioDocument): string {
  const input = resolveInput(path, after) ?? resolveInput(path, before);
  if (!input) return "the document";
  const place = /\.(\d+)\./.exec(path)?.[1];
  const name = lower(input.name) + (place === undefined ? "" : ` ${Number(place) + 1}`);
  const [from, to] = [valueWords(input, before), valueWords(input, after)];
  const unit = / [^\d\s]+$/.exec(to)?.[0];
  return `${name} ${unit && from.endsWith(unit) ? from.slice(0, -unit.length) : from} to ${to}`;
}
