/**
 * exp(M) of a small dense matrix by scaling and squaring with a Taylor sum.
 * @param m n x n, row major, finite; overwritten as work space @param out n x n result
 * Error: a few n eps of the result's norm for the stable matrices used here. Not for n over about 16 (cost n^3).
 * Source: C. Moler, C. Van Loan, "Nineteen dubious ways to compute the exponential of a matrix, twenty-five years later",
 * SIAM Review 45 (2003), method 3 with series of degree 18 at norm <= 1/2 (remainder below 1e-22).
 */
export function matrixExponential(m: Float64Array, n: number, out: Float64Array): void {
  let norm = 0;
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < n; j++) sum += Math.abs(m[i * n + j]!);
    if (sum > norm) norm = sum;
  }
  const squarings = norm > 0.5 ? Math.ceil(Math.log2(norm / 0.5)) : 0;
  const scale = 2 ** -squarings;
  for (let k = 0; k < n * n; k++) m[k]! *= scale;
  const term = new Float64Array(n * n);
  const next = new Float64Array(n * n);
  out.fill(0);
  for (let i = 0; i < n; i++) out[i * n + i] = term[i * n + i] = 1;
  for (let k = 1; k <= 18; k++) {
    multiply(term, m, n, next);
    for (let j = 0; j < n * n; j++) {
      term[j] = next[j]! / k;
      out[j]! += term[j]!;
    }
  }
  for (let s = 0; s < squarings; s++) {
    multiply(out, out, n, next);
    out.set(next);
  }
}

function multiply(a: Float64Array, b: Float64Array, n: number, out: Float64Array): void {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += a[i * n + k]! * b[k * n + j]!;
      out[i * n + j] = sum;
    }
  }
}
