import { z } from "zod";
import { LENGTHS, rangeOf } from "./ranges";

/** A finite number within the limits of the table. NaN and the infinities are no numbers to zod. */
export function quantity(path: string, faultKind?: string) {
  const range = rangeOf(path, faultKind);
  if (!range) throw new Error(`no range for ${path}`);
  let schema = z.number().min(range.min);
  schema = range.isMaxOpen ? schema.lt(range.max) : schema.max(range.max);
  return range.isWhole ? schema.int() : schema;
}

/** PostgreSQL's jsonb takes neither NUL nor half a surrogate pair, so no text may hold one. */
const isStorable = (value: string) => value.isWellFormed() && !value.includes("\u0000");

/** Title (one line) or notes. */
export function text(field: "title" | "notes") {
  const [min, max] = LENGTHS[field];
  const base = z.string().min(min).max(max);
  if (field === "notes") return base.refine(isStorable, { error: "characters" });
  return base.refine((value) => isStorable(value) && !/\p{Cc}/u.test(value) && value.trim() !== "", {
    error: "characters",
  });
}
