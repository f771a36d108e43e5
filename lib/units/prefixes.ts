/** SI prefixes used in engineering notation (ISO 80000-1, table of prefixes), powers of a thousand from femto to tera. */
export const PREFIXES: ReadonlyArray<{ symbol: string; power: number }> = [
  { symbol: "f", power: -15 },
  { symbol: "p", power: -12 },
  { symbol: "n", power: -9 },
  { symbol: "µ", power: -6 },
  { symbol: "m", power: -3 },
  { symbol: "", power: 0 },
  { symbol: "k", power: 3 },
  { symbol: "M", power: 6 },
  { symbol: "G", power: 9 },
  { symbol: "T", power: 12 },
];

/** What people type for a prefix: the micro sign, the Greek letter, a plain u; k in either case. */
const TYPED: Readonly<Record<string, number>> = {
  f: -15,
  p: -12,
  n: -9,
  µ: -6,
  μ: -6,
  u: -6,
  m: -3,
  k: 3,
  K: 3,
  M: 6,
  G: 9,
  T: 12,
};

/** Power of ten of a typed prefix, or undefined. */
export const prefixPower = (typed: string): number | undefined =>
  Object.hasOwn(TYPED, typed) ? TYPED[typed] : undefined;

/** `value` times ten to the `power` as one correctly rounded operation: powers of ten up to 22 are exact doubles. */
export function scaled(value: number, power: number): number {
  return power < 0 ? value / 10 ** -power : value * 10 ** power;
}
