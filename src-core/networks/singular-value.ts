/**
 * Largest singular value of a small complex matrix: the root of the largest eigenvalue of SᴴS, by Jacobi's rotations.
 * @param s row by row, re and im, n² of them from `at` on
 * Source: Jacobi 1846 for Hermitian matrices, e.g. Golub and Van Loan, Matrix Computations, 8.5. Check values F-15, N-19.
 */
export function largestSingularValue(s: Float64Array, n: number, at = 0): number {
  if (n === 1) return Math.hypot(s[at], s[at + 1]);
  const h = gram(s, n, at);
  for (let sweep = 0; sweep < 30; sweep++) {
    let off = 0;
    let trace = 0;
    for (let p = 0; p < n; p++) {
      trace += h[2 * (p * n + p)];
      for (let q = p + 1; q < n; q++) off += h[2 * (p * n + q)] ** 2 + h[2 * (p * n + q) + 1] ** 2;
    }
    if (off <= 1e-30 * trace * trace) break;
    for (let p = 0; p < n; p++) for (let q = p + 1; q < n; q++) rotate(h, n, p, q);
  }
  let largest = 0;
  for (let p = 0; p < n; p++) largest = Math.max(largest, h[2 * (p * n + p)]);
  return Math.sqrt(largest);
}

/** A bound that costs little: √(largest column sum × largest row sum). */
export function singularValueBound(s: Float64Array, n: number, at = 0): number {
  const rows = [0, 0, 0, 0];
  const columns = [0, 0, 0, 0];
  for (let row = 0; row < n; row++) {
    for (let column = 0; column < n; column++) {
      const i = at + 2 * (row * n + column);
      const size = Math.sqrt(s[i] * s[i] + s[i + 1] * s[i + 1]);
      rows[row] += size;
      columns[column] += size;
    }
  }
  return Math.sqrt(Math.max(...rows) * Math.max(...columns));
}

/** SᴴS. */
function gram(s: Float64Array, n: number, at: number): Float64Array {
  const h = new Float64Array(2 * n * n);
  for (let p = 0; p < n; p++) {
    for (let q = 0; q < n; q++) {
      for (let k = 0; k < n; k++) {
        const i = at + 2 * (k * n + p);
        const j = at + 2 * (k * n + q);
        h[2 * (p * n + q)] += s[i] * s[j] + s[i + 1] * s[j + 1];
        h[2 * (p * n + q) + 1] += s[i] * s[j + 1] - s[i + 1] * s[j];
      }
    }
  }
  return h;
}

/** One unitary rotation that makes h[p][q] zero: h = Uᴴ h U. */
function rotate(h: Float64Array, n: number, p: number, q: number): void {
  const re = h[2 * (p * n + q)];
  const im = h[2 * (p * n + q) + 1];
  const size = Math.hypot(re, im);
  if (size === 0) return;
  const theta = 0.5 * Math.atan2(2 * size, h[2 * (q * n + q)] - h[2 * (p * n + p)]);
  const c = Math.cos(theta);
  const sr = (Math.sin(theta) * re) / size;
  const si = (Math.sin(theta) * im) / size;
  // columns: p' = c p − conj(s) q, q' = s p + c q
  for (let k = 0; k < n; k++) {
    const i = 2 * (k * n + p);
    const j = 2 * (k * n + q);
    const [pr, pi, qr, qi] = [h[i], h[i + 1], h[j], h[j + 1]];
    h[i] = c * pr - (sr * qr + si * qi);
    h[i + 1] = c * pi - (sr * qi - si * qr);
    h[j] = sr * pr - si * pi + c * qr;
    h[j + 1] = sr * pi + si * pr + c * qi;
  }
  // rows, with the conjugate
  for (let k = 0; k < n; k++) {
    const i = 2 * (p * n + k);
    const j = 2 * (q * n + k);
    const [pr, pi, qr, qi] = [h[i], h[i + 1], h[j], h[j + 1]];
    h[i] = c * pr - (sr * qr - si * qi);
    h[i + 1] = c * pi - (sr * qi + si * qr);
    h[j] = sr * pr + si * pi + c * qr;
    h[j + 1] = sr * pi - si * pr + c * qi;
  }
}
