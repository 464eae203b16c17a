import type { TwoPort } from '../networks/types';

/** Below this, |1 − a22·b11|² is a resonance without any loss; it is kept off zero so that no infinity arises. */
const leastDenominator = 1e-30;

/**
 * Two two-ports in a chain, `a` on the transmitter's side: the star product, which stays exact where a transmission is zero
 * (a chain of transfer matrices divides by it).
 * s11 = a11 + a12 b11 a21 / D, s12 = a12 b12 / D, s21 = b21 a21 / D, s22 = b22 + b21 a22 b12 / D with D = 1 − a22 b11.
 * @param out receives the result, as long as `a`; not `a` or `b`; a new array if left out
 * Source: Redheffer, J. Math. Phys. 41, 1962, 1-41; for two-ports any microwave textbook (check value N-08).
 */
export function starTwoPort(a: TwoPort, b: TwoPort, out: TwoPort = new Float64Array(a.length)): TwoPort {
  for (let i = 0; i < a.length; i += 8) {
    const a12r = a[i + 2];
    const a12i = a[i + 3];
    const a21r = a[i + 4];
    const a21i = a[i + 5];
    const a22r = a[i + 6];
    const a22i = a[i + 7];
    const b11r = b[i];
    const b11i = b[i + 1];
    const b12r = b[i + 2];
    const b12i = b[i + 3];
    const b21r = b[i + 4];
    const b21i = b[i + 5];

    const dr = 1 - a22r * b11r + a22i * b11i;
    const di = -(a22r * b11i + a22i * b11r);
    const scale = 1 / Math.max(dr * dr + di * di, leastDenominator);
    const er = dr * scale;
    const ei = -di * scale;

    // a21 / D and b12 / D serve two results each
    const pr = a21r * er - a21i * ei;
    const pi = a21r * ei + a21i * er;
    const qr = b12r * er - b12i * ei;
    const qi = b12r * ei + b12i * er;

    const ur = a12r * b11r - a12i * b11i;
    const ui = a12r * b11i + a12i * b11r;
    const vr = b21r * a22r - b21i * a22i;
    const vi = b21r * a22i + b21i * a22r;

    out[i] = a[i] + ur * pr - ui * pi;
    out[i + 1] = a[i + 1] + ur * pi + ui * pr;
    out[i + 2] = a12r * qr - a12i * qi;
    out[i + 3] = a12r * qi + a12i * qr;
    out[i + 4] = b21r * pr - b21i * pi;
    out[i + 5] = b21r * pi + b21i * pr;
    out[i + 6] = b[i + 6] + vr * qr - vi * qi;
    out[i + 7] = b[i + 7] + vr * qi + vi * qr;
  }
  return out;
}
