import type { AffineMode } from "../model/affine";
import { matrixExponential } from "./expm";
import type { Spectrum } from "./spectrum";

/**
 * The exact map of one mode over one duration, with what two cascaded poles make of the state in the meantime.
 * With p the amplifier's pole and q the filter's (rad/s; q = 0: no filter), over the duration h:
 *   [0..11]  x(h) = Phi x(0) + gamma                                      3 rows of [3 | 1]
 *   [12..23] integral of p e^(-p(h-t)) x(t) dt                             as a map of x(0)
 *   [24..35] the same through both poles, p q
 *   [36..39] e^(-ph), e^(-qh), q (e^(-ph) - e^(-qh))/(q - p), and the response of both poles to a constant 1
 * The integrals are divided differences of the exponential on the nodes lambda, 0, -p, -q.
 * Source: C. de Boor, "Divided differences", Surveys in Approximation Theory 1 (2005); convolution of exponentials.
 */
export const OPERATOR_LENGTH = 40;
export const AT_POLE1 = 12;
export const AT_POLE2 = 24;
export const AT_SCALARS = 36;

export type Poles = { amplifierRadPerS: number; filterRadPerS: number };

/** Relative distance of a pole from an eigenvalue below which the quotients lose too many digits. */
const CLOSE = 1e-4;

/** (e^(-a h) - e^(-b h))/(b - a), safe for a near b. */
export function exponentialDifference(a: number, b: number, h: number): number {
  const x = (b - a) * h;
  if (Math.abs(x) < 0.5) return x === 0 ? h * Math.exp(-a * h) : (Math.exp(-a * h) * -Math.expm1(-x)) / (b - a);
  return (Math.exp(-a * h) - Math.exp(-b * h)) / (b - a);
}

function isNear(re: number, im: number, pole: number): boolean {
  return pole > 0 && Math.hypot(re + pole, im) < CLOSE * (Math.abs(re) + pole);
}

/** Fills `out` for the mode over `h` seconds. */
export function buildOperator(mode: AffineMode, spectrum: Spectrum, poles: Poles, h: number, out: Float64Array): void {
  const p = poles.amplifierRadPerS;
  const q = poles.filterRadPerS;
  const ep = Math.exp(-p * h);
  const eq = q > 0 ? Math.exp(-q * h) : 0;
  const dpq = q > 0 ? exponentialDifference(p, q, h) : 0;
  out[36] = ep;
  out[37] = eq;
  out[38] = q * dpq;
  out[39] = 1 - eq - q * dpq;
  let isSafe = spectrum.isSpectral;
  for (let k = 0; isSafe && k < spectrum.count; k++) {
    isSafe = !isNear(spectrum.re[k]!, spectrum.im[k]!, p) && !isNear(spectrum.re[k]!, spectrum.im[k]!, q);
  }
  if (!isSafe) {
    buildByExponential(mode, p, q, h, out);
    return;
  }
  out.fill(0, 0, AT_SCALARS);
  for (let j = 0; j < 3; j++) {
    if (!spectrum.isFrozen[j]) continue;
    out[5 * j] = 1;
    out[AT_POLE1 + 5 * j] = 1 - ep;
    out[AT_POLE2 + 5 * j] = out[39]!;
  }
  const d0p = -Math.expm1(-p * h) / p;
  const d0pq = q > 0 ? (p * (d0p - dpq)) / q : 0; // p times the divided difference on 0, -p, -q
  for (let k = 0; k < spectrum.count; k++) {
    if (spectrum.im[k] === 0) addReal(spectrum, k, p, q, h, ep, p * dpq, d0p, d0pq, out);
    else addPair(spectrum, k, p, q, h, ep, p * dpq, d0p, d0pq, out);
  }
}

function addReal(s: Spectrum, k: number, p: number, q: number, h: number, ep: number, pdpq: number, d0p: number, d0pq: number, out: Float64Array): void {
  const lambda = s.re[k]!;
  const e = Math.exp(lambda * h);
  const d0 = lambda === 0 ? h : Math.expm1(lambda * h) / lambda;
  const sp = lambda + p;
  const x = sp * h;
  const p1 = Math.abs(x) < 0.5 ? (p * ep * Math.expm1(x)) / sp : (p * (e - ep)) / sp;
  const g1 = (p * (d0 - d0p)) / sp;
  const p2 = q > 0 ? (q * (p1 - pdpq)) / (lambda + q) : 0;
  const g2 = q > 0 ? (q * (g1 - d0pq)) / (lambda + q) : 0;
  const at = 12 * k;
  const E = s.eRe;
  const G = s.gRe;
  for (let j = 0; j < 12; j++) {
    const ej = E[at + j]!;
    const gj = G[at + j]!;
    out[j]! += e * ej + d0 * gj;
    out[AT_POLE1 + j]! += p1 * ej + g1 * gj;
    out[AT_POLE2 + j]! += p2 * ej + g2 * gj;
  }
}

/** The same for a complex pair; every quotient is by a complex number (cr + j ci). */
function addPair(s: Spectrum, k: number, p: number, q: number, h: number, ep: number, pdpq: number, d0p: number, d0pq: number, out: Float64Array): void {
  const a = s.re[k]!;
  const w = s.im[k]!;
  const grow = Math.exp(a * h);
  const er = grow * Math.cos(w * h);
  const ei = grow * Math.sin(w * h);
  const half = Math.sin(0.5 * w * h);
  const size0 = a * a + w * w;
  const nr = Math.expm1(a * h) * Math.cos(w * h) - 2 * half * half;
  const d0r = (nr * a + ei * w) / size0;
  const d0i = (ei * a - nr * w) / size0;
  const sizeP = (a + p) ** 2 + w * w;
  const p1r = (p * ((er - ep) * (a + p) + ei * w)) / sizeP;
  const p1i = (p * (ei * (a + p) - (er - ep) * w)) / sizeP;
  const g1r = (p * ((d0r - d0p) * (a + p) + d0i * w)) / sizeP;
  const g1i = (p * (d0i * (a + p) - (d0r - d0p) * w)) / sizeP;
  const sizeQ = (a + q) ** 2 + w * w;
  const p2r = q > 0 ? (q * ((p1r - pdpq) * (a + q) + p1i * w)) / sizeQ : 0;
  const p2i = q > 0 ? (q * (p1i * (a + q) - (p1r - pdpq) * w)) / sizeQ : 0;
  const g2r = q > 0 ? (q * ((g1r - d0pq) * (a + q) + g1i * w)) / sizeQ : 0;
  const g2i = q > 0 ? (q * (g1i * (a + q) - (g1r - d0pq) * w)) / sizeQ : 0;
  const at = 12 * k;
  for (let j = 0; j < 12; j++) {
    const eRe = s.eRe[at + j]!;
    const eIm = s.eIm[at + j]!;
    const gRe = s.gRe[at + j]!;
    const gIm = s.gIm[at + j]!;
    out[j]! += er * eRe - ei * eIm + d0r * gRe - d0i * gIm;
    out[AT_POLE1 + j]! += p1r * eRe - p1i * eIm + g1r * gRe - g1i * gIm;
    out[AT_POLE2 + j]! += p2r * eRe - p2i * eIm + g2r * gRe - g2i * gIm;
  }
}

/** The same map by the exponential of the augmented system [x, 1, z, y]: for eigenvalues or poles that nearly meet. */
function buildByExponential({ a, b }: AffineMode, p: number, q: number, h: number, out: Float64Array): void {
  const n = q > 0 ? 10 : 7;
  const m = new Float64Array(n * n);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 3; j++) m[n * i + j] = a[3 * i + j]! * h;
    m[n * i + 3] = b[i]! * h;
    m[n * (4 + i) + 4 + i] = -p * h;
    m[n * (4 + i) + i] = p * h;
    if (q > 0) {
      m[n * (7 + i) + 7 + i] = -q * h;
      m[n * (7 + i) + 4 + i] = q * h;
    }
  }
  const result = new Float64Array(n * n);
  matrixExponential(m, n, result);
  for (let i = 0; i < 3; i++) {
    for (let j = 0; j < 4; j++) {
      out[4 * i + j] = result[n * i + j]!;
      out[AT_POLE1 + 4 * i + j] = result[n * (4 + i) + j]!;
      out[AT_POLE2 + 4 * i + j] = q > 0 ? result[n * (7 + i) + j]! : 0;
    }
  }
}

/** Component of the operator `o` whose four coefficients start at `at`, for the state x. */
export const affineAt = (o: Float64Array, at: number, x: Float64Array) => o[at]! * x[0]! + o[at + 1]! * x[1]! + o[at + 2]! * x[2]! + o[at + 3]!;

/** x after the operator. */
export function advance(o: Float64Array, x: Float64Array): void {
  const a = affineAt(o, 0, x);
  const b = affineAt(o, 4, x);
  const c = affineAt(o, 8, x);
  x[0] = a;
  x[1] = b;
  x[2] = c;
}
