import type { SeriesName } from "@/lib/units/preferred";
import type { ScenarioDocument } from "./schema";

export const SECTIONS = [
  { id: "supply", title: "Supply" },
  { id: "bridge", title: "Bridge" },
  { id: "command", title: "Command" },
  { id: "load", title: "Load" },
  { id: "shaft", title: "Shaft" },
  { id: "sensing", title: "Sensing" },
  { id: "amplifier", title: "Amplifier" },
  { id: "reference", title: "Reference" },
  { id: "filter", title: "Output filter" },
  { id: "converter", title: "Converter" },
  { id: "run", title: "Run" },
  { id: "faults", title: "Faults" },
] as const;
export type SectionId = (typeof SECTIONS)[number]["id"];

/** Where the thumb may go; the number field takes the whole range. `step` is that of the arrow keys on linear sliders. */
export type Slider = { min: number; max: number; scale: "linear" | "log"; step?: number };

type InputBase = {
  /** With `*` in the place of the row number for the fields of a list. */
  path: string;
  section: SectionId;
  /** Short, for the row; `name` is complete, for notices, differences and undo. */
  label: string;
  name: string;
  /** Quantity symbol; what follows the underscore is the subscript: `V_s`. */
  symbol?: string;
  help?: string;
  /** Whether the field exists in this document and may be edited; `index` is the row for fields of a list. */
  applies(document: ScenarioDocument, index?: number): boolean;
  /** Rarely changed: shown when the section is opened in full. */
  isDetail: boolean;
};

export type QuantityInput = InputBase & {
  kind: "quantity";
  /** For lib/units; `share` where the document holds a fraction that is shown in per cent. */
  unit: string;
  min: number;
  max: number;
  isMaxOpen: boolean;
  isWhole: boolean;
  /** Clearing the field leaves it out of the document. */
  isOptional: boolean;
  slider?: Slider;
  series?: SeriesName;
};
export type ChoiceInput = InputBase & { kind: "choice" };
export type FlagInput = InputBase & { kind: "flag" };
/** A part of the document that may be absent, such as the gear: switched on with starting values, or left out. */
export type PartInput = InputBase & { kind: "part" };

export type Input = QuantityInput | ChoiceInput | FlagInput | PartInput;
