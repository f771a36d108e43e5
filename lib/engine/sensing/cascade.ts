import { exponentialDifference, type Poles } from "../solver/operator";

/**
 * Response of one pole and of two cascaded poles to a polynomial input over a short time: what a commutation ramp needs.
 * The input is given by its values at five equally spaced nodes; a ramp's input is a product of a straight line and a
 * smooth current, for which the interpolation error is below (|lambda| h)^5 / 1e5 of the current's change.
 */
export const NODE_COUNT = 5;
const DEGREE = NODE_COUNT - 1;

/** Monomial coefficients (in t/h) from values at t/h = 0, 1/4, 1/2, 3/4, 1: rows are coefficients. */
const TO_MONOMIAL = [
  [1, 0, 0, 0, 0],
  [-25 / 3, 16, -12, 16 / 3, -1],
  [70 / 3, -208 / 3, 76, -112 / 3, 22 / 3],
  [-80 / 3, 96, -128, 224 / 3, -16],
  [32 / 3, -128 / 3, 64, -128 / 3, 32 / 3],
];

/** Coefficients of the interpolating polynomial in t/h. */
export function toMonomials(nodes: Float64Array, at: number, out: Float64Array): void {
  for (let k = 0; k <= DEGREE; k++) {
    const row = TO_MONOMIAL[k]!;
    let sum = 0;
    for (let j = 0; j < NODE_COUNT; j++) sum += row[j]! * nodes[at + j]!;
    out[k] = sum;
  }
}

export function polynomialAt(c: Float64Array, s: number): number {
  return (((c[4]! * s + c[3]!) * s + c[2]!) * s + c[1]!) * s + c[0]!;
}

/** out[k] = response at d of a pole p to (t/d)^k, from rest; k = 0..4. */
function oneOfMonomials(p: number, d: number, out: Float64Array): void {
  const x = p * d;
  if (x >= 0.5) {
    out[0] = -Math.expm1(-x);
    for (let k = 1; k <= DEGREE; k++) out[k] = 1 - (k / x) * out[k - 1]!;
    return;
  }
  for (let k = 0; k <= DEGREE; k++) {
    // x k! sum over m of (-x)^m/(k + 1 + m)!
    let term = x / (k + 1);
    let sum = term;
    for (let m = 1; m < 20 && Math.abs(term) > 1e-18 * Math.abs(sum); m++) {
      term *= -x / (k + 1 + m);
      sum += term;
    }
    out[k] = sum;
  }
}

const ONE = new Float64Array(NODE_COUNT);
const TWO = new Float64Array(NODE_COUNT);

/** The same through both poles. Divides by the faster pole only, so that slow ones lose nothing. */
function twoOfMonomials({ amplifierRadPerS: p, filterRadPerS: q }: Poles, d: number, out: Float64Array): void {
  const fast = Math.max(p, q);
  const slow = Math.min(p, q);
  if (fast * d >= 0.5) {
    oneOfMonomials(slow, d, out);
    out[0]! -= slow * exponentialDifference(slow, fast, d);
    for (let k = 1; k <= DEGREE; k++) out[k]! -= (k / (fast * d)) * out[k - 1]!;
    return;
  }
  // p q d^2 k! sum over n of h_n(-p d, -q d)/(k + 2 + n)!, h_n the complete symmetric polynomial
  const a = -p * d;
  const b = -q * d;
  for (let k = 0; k <= DEGREE; k++) {
    let symmetric = 1;
    let powerB = 1;
    let weight = 1 / ((k + 1) * (k + 2));
    let sum = weight;
    for (let n = 1; n <= 16; n++) {
      powerB *= b;
      symmetric = symmetric * a + powerB;
      weight /= k + 2 + n;
      sum += symmetric * weight;
    }
    out[k] = a * b * sum;
  }
}

/**
 * Responses, one and two poles, to a polynomial piece that acts from `fromShare` to `toShare` of h and then stops,
 * both seen at h. `c`: monomials in t/h. Writes [one, two] to out at `at`.
 */
export function segmentResponse(poles: Poles, c: Float64Array, fromShare: number, toShare: number, h: number, out: Float64Array, at: number): void {
  const width = toShare - fromShare;
  const d = width * h;
  if (d <= 0) return;
  oneOfMonomials(poles.amplifierRadPerS, d, ONE);
  if (poles.filterRadPerS > 0) twoOfMonomials(poles, d, TWO);
  let one = 0;
  let two = 0;
  // the polynomial about fromShare, in (t - from)/d: Taylor coefficients by repeated synthetic division
  const shifted = SHIFTED;
  shifted.set(c);
  for (let i = 0; i < DEGREE; i++) for (let j = DEGREE - 1; j >= i; j--) shifted[j]! += shifted[j + 1]! * fromShare;
  let scale = 1;
  for (let k = 0; k <= DEGREE; k++) {
    one += shifted[k]! * scale * ONE[k]!;
    two += shifted[k]! * scale * TWO[k]!;
    scale *= width;
  }
  const restS = (1 - toShare) * h;
  if (restS > 0) {
    const p = poles.amplifierRadPerS;
    const q = poles.filterRadPerS;
    if (q > 0) two = two * Math.exp(-q * restS) + one * q * exponentialDifference(p, q, restS);
    one *= Math.exp(-p * restS);
  }
  out[at]! += one;
  if (poles.filterRadPerS > 0) out[at + 1]! += two;
}

const SHIFTED = new Float64Array(NODE_COUNT);

/** Weights of the five node values for the responses at h: out[0..4] one pole, out[5..9] both. */
export function nodeWeights(poles: Poles, h: number, out: Float64Array): void {
  oneOfMonomials(poles.amplifierRadPerS, h, ONE);
  if (poles.filterRadPerS > 0) twoOfMonomials(poles, h, TWO);
  else TWO.fill(0);
  for (let j = 0; j < NODE_COUNT; j++) {
    let one = 0;
    let two = 0;
    for (let k = 0; k <= DEGREE; k++) {
      one += ONE[k]! * TO_MONOMIAL[k]![j]!;
      two += TWO[k]! * TO_MONOMIAL[k]![j]!;
    }
    out[j] = one;
    out[NODE_COUNT + j] = two;
  }
}
