/**
 * A chain of two-ports at one frequency as an ABCD matrix: 8 numbers, re and im of A, B, C, D; built from port 1 on.
 * All members are reciprocal, so AD − BC = 1. Source: Pozar, Microwave Engineering, Table 4.1 and 4.2.
 */
export type Chain = Float64Array;

/** A straight through. */
export function startChain(m: Chain): void {
  m.fill(0);
  m[0] = 1;
  m[6] = 1;
}

/** Appends a shunt admittance: A += B·Y, C += D·Y. */
export function appendShunt(m: Chain, yRe: number, yIm: number): void {
  m[0] += m[2] * yRe - m[3] * yIm;
  m[1] += m[2] * yIm + m[3] * yRe;
  m[4] += m[6] * yRe - m[7] * yIm;
  m[5] += m[6] * yIm + m[7] * yRe;
}

/** Appends a series impedance: B += A·Z, D += C·Z. */
export function appendSeries(m: Chain, zRe: number, zIm: number): void {
  m[2] += m[0] * zRe - m[1] * zIm;
  m[3] += m[0] * zIm + m[1] * zRe;
  m[6] += m[4] * zRe - m[5] * zIm;
  m[7] += m[4] * zIm + m[5] * zRe;
}

/** cosh and sinh of γl: 4 numbers. */
export function hyperbolic(alpha: number, beta: number, out: Float64Array): void {
  const c = Math.cos(beta);
  const s = Math.sin(beta);
  const grown = Math.exp(alpha) / 2;
  const ch = grown + 0.25 / grown;
  const sh = grown - 0.25 / grown;
  out[0] = ch * c;
  out[1] = sh * s;
  out[2] = sh * c;
  out[3] = ch * s;
}

/** Appends a short line: its cosh γl, sinh γl (`h`, from {@link hyperbolic}) and characteristic impedance. */
export function appendLine(m: Chain, h: Float64Array, zRe: number, zIm: number): void {
  const scale = 1 / (zRe * zRe + zIm * zIm);
  const bRe = h[2] * zRe - h[3] * zIm;
  const bIm = h[2] * zIm + h[3] * zRe;
  const cRe = (h[2] * zRe + h[3] * zIm) * scale;
  const cIm = (h[3] * zRe - h[2] * zIm) * scale;
  for (let row = 0; row < 8; row += 4) {
    const aRe = m[row];
    const aIm = m[row + 1];
    const dRe = m[row + 2];
    const dIm = m[row + 3];
    m[row] = aRe * h[0] - aIm * h[1] + dRe * cRe - dIm * cIm;
    m[row + 1] = aRe * h[1] + aIm * h[0] + dRe * cIm + dIm * cRe;
    m[row + 2] = aRe * bRe - aIm * bIm + dRe * h[0] - dIm * h[1];
    m[row + 3] = aRe * bIm + aIm * bRe + dRe * h[1] + dIm * h[0];
  }
}

/** Scattering of a chain between equal references; 8 numbers at `at`, s12 the same as s21. Pozar, Table 4.2. */
export function scatterChain(m: Chain, reference: number, out: Float64Array, at: number): void {
  const bRe = m[2] / reference;
  const bIm = m[3] / reference;
  const cRe = m[4] * reference;
  const cIm = m[5] * reference;
  const dRe = m[0] + bRe + cRe + m[6];
  const dIm = m[1] + bIm + cIm + m[7];
  const over = 1 / (dRe * dRe + dIm * dIm);
  const n1Re = m[0] + bRe - cRe - m[6];
  const n1Im = m[1] + bIm - cIm - m[7];
  const n2Re = -m[0] + bRe - cRe + m[6];
  const n2Im = -m[1] + bIm - cIm + m[7];
  out[at] = (n1Re * dRe + n1Im * dIm) * over;
  out[at + 1] = (n1Im * dRe - n1Re * dIm) * over;
  out[at + 2] = out[at + 4] = 2 * dRe * over;
  out[at + 3] = out[at + 5] = -2 * dIm * over;
  out[at + 6] = (n2Re * dRe + n2Im * dIm) * over;
  out[at + 7] = (n2Im * dRe - n2Re * dIm) * over;
}

/**
 * Input admittance of a short line that ends in the admittance at `y` (2 numbers), written back there.
 * Y = Y0 (Y cosh + Y0 sinh)/(Y0 cosh + Y sinh), as (Y cosh + Y0 sinh)/(cosh + Z0 Y sinh).
 */
export function transformAdmittance(y: Float64Array, h: Float64Array, zRe: number, zIm: number): void {
  const scale = 1 / (zRe * zRe + zIm * zIm);
  const nRe = y[0] * h[0] - y[1] * h[1] + (h[2] * zRe + h[3] * zIm) * scale;
  const nIm = y[0] * h[1] + y[1] * h[0] + (h[3] * zRe - h[2] * zIm) * scale;
  const tRe = h[2] * zRe - h[3] * zIm;
  const tIm = h[2] * zIm + h[3] * zRe;
  const dRe = h[0] + y[0] * tRe - y[1] * tIm;
  const dIm = h[1] + y[0] * tIm + y[1] * tRe;
  const over = 1 / Math.max(1e-60, dRe * dRe + dIm * dIm);
  y[0] = (nRe * dRe + nIm * dIm) * over;
  y[1] = (nIm * dRe - nRe * dIm) * over;
}
