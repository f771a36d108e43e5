import { PREFIXES, scaled } from "./prefixes";
import { unitInfo } from "./unit-table";

export type FormattedQuantity = {
  /** The digits, with U+2212 as minus and a thin space between thousands. */
  number: string;
  /** The unit with its prefix; empty for plain numbers. */
  unit: string;
  /** Number and unit with one space between. */
  text: string;
  /** The prefix alone, to be given back to `parseQuantity` as `displayPrefix`. */
  prefix: string;
};

export type FormatOptions = {
  /** Significant digits, 1..15; default 4. */
  digits?: number;
  /** Keep trailing zeros, so that columns of figures line up. */
  isFixed?: boolean;
  /** Use this prefix whatever the size, so that a slider does not change its unit while it moves. */
  prefix?: string;
};

export const MINUS = "\u2212";
export const THIN_SPACE = "\u2009";
/** What stands for a value that does not exist. */
export const NO_VALUE = "\u2013";

function grouped(digits: string): string {
  const [whole, fraction] = digits.split(".");
  const spaced = whole.length > 4 ? whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE) : whole;
  return fraction === undefined ? spaced : `${spaced}.${fraction}`;
}

/** Plain decimal digits of |value| with `digits` significant places; exponent form outside 1e-9..1e15. */
function decimal(magnitude: number, digits: number, isFixed: boolean): string {
  const exponent = magnitude === 0 ? 0 : Number(magnitude.toExponential(digits - 1).split("e")[1]);
  if (exponent < -9 || exponent > 14) {
    const [mantissa, power] = magnitude.toExponential(digits - 1).split("e");
    return `${isFixed ? mantissa : String(Number(mantissa))}e${power.replace("+", "")}`;
  }
  const places = digits - 1 - exponent;
  const rounded =
    places >= 0
      ? magnitude.toFixed(Math.min(places, 30))
      : String(Math.round(magnitude / 10 ** -places) * 10 ** -places);
  return grouped(isFixed || !rounded.includes(".") ? rounded : rounded.replace(/\.?0+$/, ""));
}

/** The prefix that leaves 1 to 999 before the point, after rounding to `digits`. */
function prefixFor(magnitude: number, digits: number): { symbol: string; power: number } {
  if (magnitude === 0) return { symbol: "", power: 0 };
  const exponent = Number(magnitude.toExponential(digits - 1).split("e")[1]);
  const wanted = Math.floor(exponent / 3) * 3;
  const clamped = Math.min(12, Math.max(-15, wanted));
  return PREFIXES.find((prefix) => prefix.power === clamped)!;
}

/**
 * Engineering notation of a value in its SI unit: 0.012, "Ω" -> "12 mΩ". Values that are no numbers give a dash.
 * Fewer digits than the value has lose the rest; `parseQuantity` reads the text back within the digits shown.
 */
export function formatQuantity(
  value: number | null | undefined,
  unit: string,
  options: FormatOptions = {},
): FormattedQuantity {
  const info = unitInfo(unit);
  const base = info.shown ?? { symbol: unit, size: 1 };
  const digits = Math.min(15, Math.max(1, Math.round(options.digits ?? 4)));
  if (value === null || value === undefined || !Number.isFinite(value)) {
    return { number: NO_VALUE, unit: base.symbol, text: NO_VALUE, prefix: "" };
  }
  // a number at the very end of the doubles may leave them in a smaller unit: the last double stands for it
  const magnitude = Math.min(Math.abs(base.size === 1 ? value : value / base.size), Number.MAX_VALUE);
  const forced = options.prefix === undefined ? undefined : PREFIXES.find((prefix) => prefix.symbol === options.prefix);
  // Zero inertia is written "0 kg·m²", not in a unit of its own
  const natural =
    magnitude === 0 && info.shown ? PREFIXES.find((prefix) => prefix.symbol === "k")! : prefixFor(magnitude, digits);
  const prefix = info.takesPrefix ? (forced ?? natural) : { symbol: "", power: 0 };
  const body = decimal(scaled(magnitude, -prefix.power), digits, options.isFixed ?? false);
  const isZero = !/[1-9]/.test(body.split("e")[0]);
  const number = value < 0 && !isZero ? MINUS + body : body;
  const symbol = prefix.symbol + base.symbol;
  return { number, unit: symbol, text: symbol === "" ? number : `${number} ${symbol}`, prefix: prefix.symbol };
}

/** "0.1 V to 2 kV": between a tenth and one, the unit itself reads better than its thousandth. */
export function formatRange(min: number, max: number, unit: string): string {
  const limit = (value: number) => {
    const isTenths = unitInfo(unit).shown === undefined && Math.abs(value) >= 0.1 && Math.abs(value) < 1;
    return formatQuantity(value, unit, isTenths ? { digits: 6, prefix: "" } : { digits: 6 }).text;
  };
  return `${limit(min)} to ${limit(max)}`;
}
