import type { SeriesName } from "@/lib/units/preferred";
import type { ChoiceInput, FlagInput, Input, PartInput, QuantityInput, SectionId, Slider } from "./input-types";
import { nameOf } from "./names";
import { rangeOf } from "./ranges";
import type { ScenarioDocument } from "./schema";

/** Builders of the rows of the table of inputs: names and limits come from ranges.ts and names.ts. */

type More = {
  label?: string;
  symbol?: string;
  help?: string;
  applies?: (document: ScenarioDocument, index?: number) => boolean;
  isDetail?: boolean;
};
type QuantityMore = More & { unit?: string; slider?: Slider; series?: SeriesName; isOptional?: boolean };

const always = () => true;

function base(section: SectionId, path: string, more: More) {
  const name = nameOf(path);
  const { label = name, symbol, help, applies = always, isDetail = false } = more;
  return { path, section, label, name, applies, isDetail, ...(symbol ? { symbol } : {}), ...(help ? { help } : {}) };
}

export function quantityInput(section: SectionId, path: string, more: QuantityMore = {}): QuantityInput {
  const range = rangeOf(path);
  if (!range) throw new Error(`no range for ${path}`);
  return {
    ...base(section, path, more),
    kind: "quantity",
    unit: more.unit ?? range.unit,
    min: range.min,
    max: range.max,
    isMaxOpen: range.isMaxOpen ?? false,
    isWhole: range.isWhole ?? false,
    isOptional: more.isOptional ?? false,
    ...(more.slider ? { slider: more.slider } : {}),
    ...(more.series ? { series: more.series } : {}),
  };
}

export const choiceInput = (section: SectionId, path: string, more: More = {}): ChoiceInput => ({
  ...base(section, path, more),
  kind: "choice",
});
export const flagInput = (section: SectionId, path: string, more: More = {}): FlagInput => ({
  ...base(section, path, more),
  kind: "flag",
});
export const partInput = (section: SectionId, path: string, more: More = {}): PartInput => ({
  ...base(section, path, more),
  kind: "part",
});

export const linear = (min: number, max: number, step: number): Slider => ({ min, max, scale: "linear", step });
export const log = (min: number, max: number): Slider => ({ min, max, scale: "log" });

/** All of a list less often needed than the rest of its section. */
export const detail = <T extends Input>(inputs: T[]): T[] => inputs.map((input) => ({ ...input, isDetail: true }));
