import { rangeAt } from "./findings";
import type { Input, QuantityInput, SectionId } from "./input-types";
import { DRIVE_INPUTS } from "./inputs-drive";
import { LOAD_INPUTS } from "./inputs-load";
import { RUN_INPUTS } from "./inputs-run";
import { SENSING_INPUTS } from "./inputs-sensing";
import { generalPath, getAt, rowIndex } from "./paths";
import { SHAFT_UNITS } from "./ranges";
import type { ScenarioDocument } from "./schema";

/** Every editable input of a scenario. The inputs panel, the notices' links, differences and undo all read this table. */
export const INPUTS: readonly Input[] = [...DRIVE_INPUTS, ...LOAD_INPUTS, ...SENSING_INPUTS, ...RUN_INPUTS];

const BY_PATH = new Map(INPUTS.map((input) => [input.path, input]));

/** Pseudo field: which of the two ways of setting the gain is used. */
export const GAIN_KIND_PATH = "sensing.amplifier.gain.kind";

/** The input of a concrete or general path, for any document. */
export const inputAt = (path: string): Input | undefined => BY_PATH.get(generalPath(path));

/** Narrows a row's quantity to what its entry allows: the unit of a shaft load, the limits of a fault's voltage. */
function narrowed(input: QuantityInput, path: string, document: ScenarioDocument): QuantityInput {
  if (input.path === "faults.*.voltageV") {
    const range = rangeAt(path, document);
    return range ? { ...input, name: range.name, min: range.min, max: range.max } : input;
  }
  if (input.path !== "load.shaft.*.value") return input;
  const kind = getAt(document, path.replace(/value$/, "kind"));
  const unit = SHAFT_UNITS[kind as keyof typeof SHAFT_UNITS] ?? "";
  return { ...input, unit, min: kind === "active" ? input.min : 0 };
}

function resolved(input: Input, path: string, document: ScenarioDocument): Input {
  return input.kind === "quantity" ? { ...narrowed(input, path, document), path } : { ...input, path };
}

/** The input at a concrete path as it stands for this document (unit, limits); undefined if there is none or it does not apply. */
export function resolveInput(path: string, document: ScenarioDocument): Input | undefined {
  const input = inputAt(path);
  return input?.applies(document, rowIndex(path)) ? resolved(input, path, document) : undefined;
}

/** The inputs of a section that apply, in order; those of lists are given by `rowInputs`. */
export function sectionInputs(section: SectionId, document: ScenarioDocument): Input[] {
  return INPUTS.filter(
    (input) => input.section === section && !input.path.includes(".*.") && input.applies(document),
  ).map((input) => resolved(input, input.path, document));
}

/** The inputs of one row of a list, with concrete paths. */
export function rowInputs(listPath: string, index: number, document: ScenarioDocument): Input[] {
  return INPUTS.filter((input) => input.path.startsWith(`${listPath}.*.`) && input.applies(document, index)).map(
    (input) => resolved(input, input.path.replace(".*.", `.${index}.`), document),
  );
}

/** The value that an input shows: a number, word, flag; for a part, whether it is there. */
export function inputValue(input: Pick<Input, "path" | "kind">, document: ScenarioDocument): unknown {
  if (input.path === GAIN_KIND_PATH) return "fixed" in document.sensing.amplifier.gain ? "fixed" : "resistors";
  const value = getAt(document, input.path);
  return input.kind === "part" ? value !== undefined : value;
}

/** The table's own words, so that a panel needs one import. */
export type { ChoiceInput, FlagInput, Input, PartInput, QuantityInput, SectionId, Slider } from "./input-types";
export { SECTIONS } from "./input-types";
export { choicesAt, choiceLabel, type Choice } from "./choices";
