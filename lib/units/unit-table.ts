/**
 * The units the product knows, by the symbol that stands in the tables of inputs and figures.
 * `takesPrefix`: engineering prefixes are written before the symbol. `names`: other ways people type the symbol.
 * `others`: units that are converted, with the factor to the SI unit. `shown`: what is written instead of the SI symbol,
 * with its size in the SI unit (inertia: kg already has a prefix, so prefixes go before g).
 */
export type UnitInfo = {
  takesPrefix: boolean;
  names: readonly string[];
  others?: Readonly<Record<string, number>>;
  shown?: { symbol: string; size: number };
};

const PLAIN: UnitInfo = { takesPrefix: false, names: [] };

export const UNITS: Readonly<Record<string, UnitInfo>> = {
  "": { takesPrefix: false, names: ["1"], others: { "%": 0.01 } },
  /** A fraction of one, stored as such and shown in per cent. */
  share: { takesPrefix: false, names: [], shown: { symbol: "%", size: 0.01 } },
  V: { takesPrefix: true, names: ["volt", "volts"] },
  A: { takesPrefix: true, names: ["amp", "amps", "ampere", "amperes"] },
  Ω: { takesPrefix: true, names: ["Ω", "ohm", "ohms", "R"] },
  H: { takesPrefix: true, names: ["henry"] },
  F: { takesPrefix: true, names: ["farad"] },
  s: { takesPrefix: true, names: ["sec", "second", "seconds"], others: { min: 60 } },
  Hz: { takesPrefix: true, names: ["hertz"] },
  W: { takesPrefix: true, names: ["watt", "watts"] },
  J: { takesPrefix: true, names: ["joule", "Ws", "W·s"] },
  "N·m": { takesPrefix: true, names: ["Nm"], others: { "N·cm": 0.01, Ncm: 0.01 } },
  "N·m/A": { takesPrefix: true, names: ["Nm/A", "V·s/rad", "Vs/rad", "V/(rad/s)"] },
  "V·s/rad": {
    takesPrefix: true,
    names: ["Vs/rad", "V·s", "Vs", "V/(rad/s)", "N·m/A", "Nm/A"],
    others: { "V/krpm": 60 / (2000 * Math.PI) },
  },
  "N·m·s/rad": { takesPrefix: true, names: ["Nms/rad", "N·m·s", "Nms", "Nm·s", "N·m/(rad/s)", "Nm/(rad/s)"] },
  "N·m·s²/rad²": { takesPrefix: true, names: ["Nms²/rad²", "N·m·s²", "Nms²", "Nms2", "N·m·s^2"] },
  "kg·m²": {
    takesPrefix: true,
    names: [],
    shown: { symbol: "g·m²", size: 1e-3 },
    others: { "g·cm²": 1e-7, gcm2: 1e-7, "kg·cm²": 1e-4, kgcm2: 1e-4 },
  },
  "rad/s": {
    takesPrefix: false,
    names: [],
    others: { rpm: Math.PI / 30, "r/min": Math.PI / 30, "1/min": Math.PI / 30 },
  },
  "V/V": { takesPrefix: false, names: ["x", "×", ""], others: {} },
  "A/V": { takesPrefix: true, names: ["S", "siemens"] },
  "V/A": { takesPrefix: true, names: ["V/A"] },
  "A/LSB": { takesPrefix: true, names: [] },
  "V/s": { takesPrefix: true, names: [], others: { "V/µs": 1e6, "V/us": 1e6, "V/μs": 1e6, "V/ms": 1e3 } },
  "V/K": { takesPrefix: true, names: ["V/°C", "V/C"] },
  "V/√Hz": { takesPrefix: true, names: ["V/rtHz", "V/sqrtHz", "V/sqrt(Hz)"] },
  "K/W": { takesPrefix: false, names: ["°C/W", "C/W"] },
  "J/K": { takesPrefix: false, names: ["J/°C", "J/C"] },
  "ppm/K": { takesPrefix: false, names: ["ppm", "ppm/°C", "ppm/C"] },
  "%": { takesPrefix: false, names: ["percent"] },
  "°C": { takesPrefix: false, names: ["C", "degC"] },
  dB: PLAIN,
  LSB: { takesPrefix: false, names: ["lsb"] },
  bit: { takesPrefix: false, names: ["bits"] },
};

/** A unit that is not in the table is written as it is, without prefixes. */
export const unitInfo = (unit: string): UnitInfo => (Object.hasOwn(UNITS, unit) ? UNITS[unit] : PLAIN);

/** Dots, spaces and superscripts are optional when typing: `kg m2`, `kg·m²` and `kgm^2` are one. Case is kept. */
export const plainUnit = (typed: string): string =>
  typed
    .replace(/[\s·⋅.*()]/g, "")
    .replace(/\u2126/g, "Ω")
    .replace(/\^?²|\^2/g, "2")
    .replace(/μ/g, "µ");
