import { formatQuantity, formatRange } from "./format";
import { prefixPower, scaled } from "./prefixes";
import { plainUnit, unitInfo } from "./unit-table";

export type ParsedQuantity =
  | {
      ok: true;
      /** In the SI unit asked for; always finite. */
      value: number;
      /** How it is read, for the line below the field: "12 mΩ". */
      reading: string;
      /** Present when a bare number did not take the unit shown; a sentence that says so. */
      note?: string;
    }
  | { ok: false; code: "empty" | "number" | "unit" | "range"; text: string; value?: number };

export type ParseOptions = {
  /** Prefix of the unit shown beside the field (from `formatQuantity`): a bare number takes it. */
  displayPrefix?: string;
  /** Hard limits in the SI unit. */
  range?: { min: number; max: number };
};

const LENGTH_MAX = 64;
const NUMBER = /^([+-]?)(\d[\d.,' ]*|[.,]\d+)(?:e([+-]?\d{1,3}))?/i;

/** "1 234,5" -> "1234.5"; undefined if separators are placed so that no reading is plain. Both point and comma are decimal. */
function plainDecimal(typed: string): string | undefined {
  let digits = typed.trim();
  if (/[ ']/.test(digits)) {
    if (!/^\d{1,3}([ ']\d{3})+([.,]\d*)?$/.test(digits)) return undefined;
    digits = digits.replace(/[ ']/g, "");
  }
  const marks = digits.replace(/\d/g, "");
  if (marks.length <= 1) return digits.replace(",", ".");
  const grouping = marks[0];
  const decimalMark = marks.at(-1) === grouping ? "" : marks.at(-1)!;
  const [whole, fraction = "", ...rest] = decimalMark ? digits.split(decimalMark) : [digits];
  if (rest.length > 0 || !new RegExp(`^\\d{1,3}(\\${grouping}\\d{3})+$`).test(whole)) return undefined;
  return `${whole.split(grouping).join("")}.${fraction}`;
}

type Factor = { power: number; factor: number };

/** Powers of ten go into the exponent of the typed number, so that 35 % is 0.35 and not a neighbour of it. */
function asFactor(factor: number): Factor {
  const power = Math.round(Math.log10(factor));
  return Math.abs(factor / 10 ** power - 1) < 1e-12 ? { power, factor: 1 } : { power: 0, factor };
}

/** What the letters after the number multiply it by; undefined when they are no way to write this unit. */
function factorOf(typed: string, unit: string): Factor | undefined {
  const info = unitInfo(unit);
  const letters = plainUnit(typed);
  const symbols = [info.shown?.symbol ?? unit, unit, ...info.names].map(plainUnit);
  const sizeOfShown = info.shown?.size ?? 1;
  const isSymbol = (text: string) =>
    symbols.some((symbol) => symbol === text || symbol.toLowerCase() === text.toLowerCase());
  for (const [name, factor] of Object.entries(info.others ?? {})) {
    const other = plainUnit(name);
    if (letters === other || letters.toLowerCase() === other.toLowerCase()) return asFactor(factor);
  }
  if (info.shown && isSymbol(letters)) {
    return asFactor(letters.toLowerCase() === plainUnit(unit).toLowerCase() ? 1 : sizeOfShown);
  }
  if (isSymbol(letters)) return { power: 0, factor: 1 };
  if (!info.takesPrefix) return undefined;
  const power = prefixPower(letters.slice(0, 1));
  if (power === undefined) return undefined;
  const rest = letters.slice(1);
  if (rest === "") return { power, factor: 1 };
  if (info.shown)
    return rest.toLowerCase() === plainUnit(info.shown.symbol).toLowerCase()
      ? { power: power + asFactor(sizeOfShown).power, factor: 1 }
      : undefined;
  return isSymbol(rest) ? { power, factor: 1 } : undefined;
}

/** `4k7`, `0R012`, `R012`: a letter in the place of the decimal point (IEC 60062 clause 4); for resistance, also R. */
function letterForPoint(typed: string, unit: string): number | undefined {
  const match = /^(\d*)([fpnµμumkKMGTR])(\d+)$/.exec(typed);
  if (!match || !unitInfo(unit).takesPrefix) return undefined;
  const [, whole, letter, fraction] = match;
  if (letter === "R") return unit === "Ω" ? Number(`${whole || "0"}.${fraction}`) : undefined;
  const power = whole === "" ? undefined : prefixPower(letter);
  return power === undefined ? undefined : scaled(Number(`${whole}.${fraction}`), power);
}

const isInside = (value: number, range: ParseOptions["range"]) => !range || (value >= range.min && value <= range.max);

function accepted(value: number, unit: string, range: ParseOptions["range"], note?: string): ParsedQuantity {
  const clean = value === 0 ? 0 : value;
  const reading = formatQuantity(clean, unit, { digits: 6 }).text;
  if (range && !isInside(clean, range)) {
    return {
      ok: false,
      code: "range",
      text: `${reading} is outside ${formatRange(range.min, range.max, unit)}.`,
      value: clean,
    };
  }
  return note === undefined ? { ok: true, value: clean, reading } : { ok: true, value: clean, reading, note };
}

/** A bare number takes the unit shown, unless that is out of range and the base unit fits (look.md section 7). */
function bareNumber(number: string, exponent: number, unit: string, options: ParseOptions): ParsedQuantity {
  const plain = Number(`${number}e${exponent}`);
  const info = unitInfo(unit);
  const isAsShown = options.displayPrefix
    ? info.takesPrefix
    : info.shown && (!info.takesPrefix || options.displayPrefix === "");
  const power = options.displayPrefix && info.takesPrefix ? prefixPower(options.displayPrefix) : 0;
  if (!isAsShown || power === undefined) return accepted(plain, unit, options.range);
  const asShown = Number(`${number}e${exponent + power + asFactor(info.shown?.size ?? 1).power}`);
  if (!isInside(asShown, options.range) && isInside(plain, options.range)) {
    const baseName = unit === "share" ? "parts of one" : unit;
    const shown = `${options.displayPrefix ?? ""}${info.shown?.symbol ?? unit}`;
    return accepted(plain, unit, options.range, `Read in ${baseName}, because in ${shown} it would be out of range.`);
  }
  return accepted(asShown, unit, options.range);
}

/**
 * Reads what a person typed as a value in `unit` (a symbol of unit-table.ts). Takes prefixes, unit names, point or comma,
 * exponents, spaces between thousands, either minus sign. Never throws, never gives NaN or an infinity.
 */
export function parseQuantity(text: string, unit: string, options: ParseOptions = {}): ParsedQuantity {
  const typed = text
    .replace(/[\u2009\u202f\u00a0\s]+/g, " ")
    .trim()
    .replace(/[\u2212\u2013]/g, "-");
  if (typed === "") return { ok: false, code: "empty", text: "Enter a number." };
  const refusal: ParsedQuantity = {
    ok: false,
    code: "number",
    text: `${JSON.stringify(typed.slice(0, 24))} is no number.`,
  };
  if (typed.length > LENGTH_MAX) return refusal;
  const coded = letterForPoint(typed, unit);
  if (coded !== undefined) return accepted(coded, unit, options.range);
  const match = NUMBER.exec(typed.replace(/^([+-]) /, "$1"));
  const number = match ? plainDecimal(match[2]) : undefined;
  if (!match || number === undefined) return refusal;
  const signed = `${match[1] === "-" ? "-" : ""}${number}`;
  const exponent = Number(match[3] ?? 0);
  if (!Number.isFinite(Number(`${signed}e${exponent}`))) return refusal;
  const letters = typed
    .replace(/^([+-]) /, "$1")
    .slice(match[0].length)
    .trim();
  if (letters === "") return bareNumber(signed, exponent, unit, options);
  const factor = factorOf(letters, unit);
  if (!factor)
    return {
      ok: false,
      code: "unit",
      text: `"${letters.slice(0, 24)}" is not ${unit === "" ? "expected here" : `a way to write ${unit === "share" ? "%" : unit}`}.`,
    };
  const value = Number(`${signed}e${exponent + factor.power}`) * factor.factor;
  return Number.isFinite(value) ? accepted(value, unit, options.range) : refusal;
}
