import type { FourPort } from '../networks/types';
import type { ModeEnds, Termination } from './terminations';

/**
 * As `transfer`, where differential and common mode convert into each other: all four ports are terminated and solved together.
 * Waves leaving the network b = S (Γ b + e), the source at the differential port of the transmitter: (I - S Γ) b = S e.
 * @param full ports d1, c1, d2, c2, see `FourPort`
 */
export function convertingTransfer(
  full: FourPort,
  frequencies: Float64Array,
  differential: ModeEnds,
  common: ModeEnds,
): Float64Array {
  const H = new Float64Array(2 * frequencies.length);
  const rows = new Float64Array(4 * 10); // four equations: four complex unknowns and the right-hand side
  for (let i = 0; i < frequencies.length; i++) {
    const w = 2 * Math.PI * frequencies[i];
    const gamma = [
      reflection(differential.source, differential.referenceOhms, w),
      reflection(common.source, common.referenceOhms, w),
      reflection(differential.load, differential.referenceOhms, w),
      reflection(common.load, common.referenceOhms, w),
    ];
    for (let r = 0; r < 4; r++) {
      for (let c = 0; c < 4; c++) {
        const re = full[32 * i + 8 * r + 2 * c];
        const im = full[32 * i + 8 * r + 2 * c + 1];
        rows[10 * r + 2 * c] = (r === c ? 1 : 0) - (re * gamma[c].re - im * gamma[c].im);
        rows[10 * r + 2 * c + 1] = -(re * gamma[c].im + im * gamma[c].re);
      }
      rows[10 * r + 8] = full[32 * i + 8 * r];
      rows[10 * r + 9] = full[32 * i + 8 * r + 1];
    }
    const b = solveFor(rows, 2);
    // source wave (2 V into an open) times 1 + Γl
    const launch = twice(differential.source, differential.referenceOhms, w, differential.referenceOhms);
    const taken = twice(differential.load, differential.referenceOhms, w, differential.load.ohms);
    const re = launch.re * taken.re - launch.im * taken.im;
    const im = launch.re * taken.im + launch.im * taken.re;
    H[2 * i] = re * b.re - im * b.im;
    H[2 * i + 1] = re * b.im + im * b.re;
  }
  return H;
}

/** (R - Z0 (1 + jωRC)) / (R + Z0 (1 + jωRC)). */
function reflection({ ohms, farads }: Termination, Z0: number, w: number) {
  const x = Z0 * w * ohms * farads;
  const size = (ohms + Z0) ** 2 + x * x;
  return { re: ((ohms - Z0) * (ohms + Z0) - x * x) / size, im: (-x * (ohms + Z0) - x * (ohms - Z0)) / size };
}

/** 2 · top / (R + Z0 (1 + jωRC)). */
function twice({ ohms, farads }: Termination, Z0: number, w: number, top: number) {
  const x = Z0 * w * ohms * farads;
  const size = (ohms + Z0) ** 2 + x * x;
  return { re: (2 * top * (ohms + Z0)) / size, im: (-2 * top * x) / size };
}

/** One unknown of four complex equations by elimination with row exchange; overwrites `rows`. */
function solveFor(rows: Float64Array, wanted: number): { re: number; im: number } {
  // the wanted unknown goes last, so that no back substitution is needed
  if (wanted !== 3) for (let r = 0; r < 4; r++) exchange(rows, 10 * r + 2 * wanted, 10 * r + 6, 2);
  for (let step = 0; step < 3; step++) {
    let best = step;
    for (let r = step + 1; r < 4; r++) if (size(rows, r, step) > size(rows, best, step)) best = r;
    if (best !== step) exchange(rows, 10 * best, 10 * step, 10);
    const scale = 1 / size(rows, step, step);
    const pivotRe = rows[12 * step] * scale;
    const pivotIm = -rows[12 * step + 1] * scale;
    for (let r = step + 1; r < 4; r++) {
      const aRe = rows[10 * r + 2 * step];
      const aIm = rows[10 * r + 2 * step + 1];
      const re = aRe * pivotRe - aIm * pivotIm;
      const im = aRe * pivotIm + aIm * pivotRe;
      for (let c = step + 1; c < 5; c++) {
        const xRe = rows[10 * step + 2 * c];
        const xIm = rows[10 * step + 2 * c + 1];
        rows[10 * r + 2 * c] -= re * xRe - im * xIm;
        rows[10 * r + 2 * c + 1] -= re * xIm + im * xRe;
      }
    }
  }
  const scale = 1 / size(rows, 3, 3);
  const [aRe, aIm, bRe, bIm] = rows.subarray(36, 40);
  return { re: (bRe * aRe + bIm * aIm) * scale, im: (bIm * aRe - bRe * aIm) * scale };
}

const size = (rows: Float64Array, r: number, c: number) => rows[10 * r + 2 * c] ** 2 + rows[10 * r + 2 * c + 1] ** 2;

function exchange(rows: Float64Array, a: number, b: number, count: number): void {
  for (let i = 0; i < count; i++) {
    const kept = rows[a + i];
    rows[a + i] = rows[b + i];
    rows[b + i] = kept;
  }
}
