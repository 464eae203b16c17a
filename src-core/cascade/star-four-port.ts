import type { FourPort } from '../networks/types';

/**
 * Two mixed-mode four-ports in a chain, `a` on the transmitter's side: the star product of 2×2 blocks.
 * S11 = A11 + A12 B11 E A21, S21 = B21 E A21, S12 = A12 F B12, S22 = B22 + B21 A22 F B12
 * with E = (1 − A22 B11)⁻¹ and F = (1 − B11 A22)⁻¹.
 * Source: Redheffer, J. Math. Phys. 41, 1962, 1-41.
 */
export function starFourPort(a: FourPort, b: FourPort, out: FourPort = new Float64Array(a.length)): FourPort {
  const [a11, a12, a21, a22] = [block(), block(), block(), block()];
  const [b11, b12, b21, b22] = [block(), block(), block(), block()];
  const [x, y, p, q, r] = [block(), block(), block(), block(), block()];
  for (let i = 0; i < a.length; i += 32) {
    take(a, i, a11);
    take(a, i + 4, a12);
    take(a, i + 16, a21);
    take(a, i + 20, a22);
    take(b, i, b11);
    take(b, i + 4, b12);
    take(b, i + 16, b21);
    take(b, i + 20, b22);

    invertOneMinus(multiply(a22, b11, x), y);
    multiply(y, a21, p); // E A21
    invertOneMinus(multiply(b11, a22, x), y);
    multiply(y, b12, q); // F B12

    multiply(a12, b11, x);
    put(add(a11, multiply(x, p, r)), out, i);
    put(multiply(a12, q, r), out, i + 4);
    put(multiply(b21, p, r), out, i + 16);
    multiply(b21, a22, x);
    put(add(b22, multiply(x, q, r)), out, i + 20);
  }
  return out;
}

/** A 2×2 complex matrix, row by row, re and im. */
type Block = Float64Array;

const block = (): Block => new Float64Array(8);

/** Rows of a four-port are 8 numbers apart. */
function take(from: FourPort, at: number, to: Block): void {
  for (let n = 0; n < 4; n++) {
    to[n] = from[at + n];
    to[n + 4] = from[at + n + 8];
  }
}

function put(from: Block, to: FourPort, at: number): void {
  for (let n = 0; n < 4; n++) {
    to[at + n] = from[n];
    to[at + n + 8] = from[n + 4];
  }
}

/** Adds `m` to `to` in place. */
function add(to: Block, m: Block): Block {
  for (let n = 0; n < 8; n++) to[n] += m[n];
  return to;
}

function multiply(m: Block, n: Block, out: Block): Block {
  for (let row = 0; row < 8; row += 4) {
    for (let column = 0; column < 4; column += 2) {
      out[row + column] =
        m[row] * n[column] - m[row + 1] * n[column + 1] + m[row + 2] * n[column + 4] - m[row + 3] * n[column + 5];
      out[row + column + 1] =
        m[row] * n[column + 1] + m[row + 1] * n[column] + m[row + 2] * n[column + 5] + m[row + 3] * n[column + 4];
    }
  }
  return out;
}

/** (1 − m)⁻¹ by the adjugate. */
function invertOneMinus(m: Block, out: Block): Block {
  const ar = 1 - m[0];
  const ai = -m[1];
  const br = -m[2];
  const bi = -m[3];
  const cr = -m[4];
  const ci = -m[5];
  const dr = 1 - m[6];
  const di = -m[7];
  const detR = ar * dr - ai * di - br * cr + bi * ci;
  const detI = ar * di + ai * dr - br * ci - bi * cr;
  const scale = 1 / Math.max(detR * detR + detI * detI, 1e-30);
  const er = detR * scale;
  const ei = -detI * scale;
  out[0] = dr * er - di * ei;
  out[1] = dr * ei + di * er;
  out[2] = -(br * er - bi * ei);
  out[3] = -(br * ei + bi * er);
  out[4] = -(cr * er - ci * ei);
  out[5] = -(cr * ei + ci * er);
  out[6] = ar * er - ai * ei;
  out[7] = ar * ei + ai * er;
  return out;
}
