"use client";

import type { Input } from "@/lib/scenario/inputs";
import { ChoiceRow, SwitchRow } from "./choice-row";
import { QuantityRow } from "./quantity-row";

/** The rows of some inputs, each by its kind. */
export function InputRows({ inputs, labelOf }: { inputs: readonly Input[]; labelOf?: (input: Input) => string }) {
  return inputs.map((input) => {
    if (input.kind === "quantity")
      return <QuantityRow key={input.path} input={input} label={labelOf?.(input) ?? input.label} />;
    if (input.kind === "choice") return <ChoiceRow key={input.path} input={input} />;
    return <SwitchRow key={input.path} input={input} />;
  });
}
