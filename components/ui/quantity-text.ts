import { formatQuantity } from "@/lib/units/format";
import { parseQuantity, type ParsedQuantity } from "@/lib/units/parse";

/** How a quantity is written and what it may be; everything in its SI unit. */
export type QuantityShape = {
  unit: string;
  min: number;
  max: number;
  /** `max` itself is refused. */
  isMaxOpen?: boolean;
  isWhole?: boolean;
};

const DIGITS = 6;

/** Number and unit as the field shows them. */
export const writeQuantity = (value: number, shape: Pick<QuantityShape, "unit">) =>
  formatQuantity(value, shape.unit, { digits: DIGITS });

/** The range in words: "0 s to 12 µs"; an open end says "below". */
export function writeRange(shape: QuantityShape): string {
  const of = (value: number) => writeQuantity(value, shape).text;
  return `${of(shape.min)} to ${shape.isMaxOpen ? "below " : ""}${of(shape.max)}`;
}

/** What was typed, as a value in the SI unit. `prefix` is the one shown beside the field: a bare number takes it. */
export function readQuantity(text: string, shape: QuantityShape, prefix: string): ParsedQuantity {
  const parsed = parseQuantity(text, shape.unit, { displayPrefix: prefix, range: { min: shape.min, max: shape.max } });
  if (!parsed.ok) return parsed;
  const refuse = (text: string, code: "range" | "number"): ParsedQuantity => ({
    ok: false,
    code,
    text,
    value: parsed.value,
  });
  if (shape.isMaxOpen && parsed.value >= shape.max)
    return refuse(`${parsed.reading} is outside ${writeRange(shape)}.`, "range");
  if (shape.isWhole && !Number.isInteger(parsed.value))
    return refuse(`${parsed.reading} is not a whole number.`, "number");
  return parsed;
}
