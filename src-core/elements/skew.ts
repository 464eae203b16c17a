import type { FourPort, Network, TwoPort } from '../networks/types';

/**
 * The same pair whose second leg is later by `seconds` (the first one, where that is below 0): a stretch of delay at its
 * leaving end, matched to the legs' reference, so that it reflects nothing and only turns one mode into the other:
 * d' = d (1+e)/2 + c (1−e)/2, c' = d (1−e)/2 + c (1+e)/2 with e = e^{−jω·seconds}. Check value N-13.
 */
export function delaySecondLeg(network: Network, seconds: number, frequencies: Float64Array): Network {
  const { differential, common = differential } = network;
  if (seconds === 0) return network;
  const full: FourPort = new Float64Array(32 * frequencies.length);
  const outD: TwoPort = new Float64Array(differential.length);
  const outC: TwoPort = new Float64Array(differential.length);
  const sign = seconds < 0 ? -1 : 1;
  for (let i = 0; i < frequencies.length; i++) {
    const angle = -2 * Math.PI * frequencies[i] * Math.abs(seconds);
    const pRe = (1 + Math.cos(angle)) / 2;
    const pIm = Math.sin(angle) / 2;
    const qRe = (sign * (1 - Math.cos(angle))) / 2;
    const qIm = -sign * pIm;
    const p2Re = pRe * pRe - pIm * pIm;
    const p2Im = 2 * pRe * pIm;
    const q2Re = qRe * qRe - qIm * qIm;
    const q2Im = 2 * qRe * qIm;
    const at = 8 * i;
    const to = 32 * i;
    for (let mode = 0; mode < 2; mode++) {
      const own = mode === 0 ? differential : common;
      const other = mode === 0 ? common : differential;
      const m = 10 * mode; // the mode's own entry at port 1
      const tRe = own[at + 4];
      const tIm = own[at + 5];
      full[to + m] = own[at];
      full[to + m + 1] = own[at + 1];
      put(full, to + 16 + m, pRe * tRe - pIm * tIm, pRe * tIm + pIm * tRe); // 21, own mode
      put(full, to + 24 - 6 * mode, qRe * tRe - qIm * tIm, qRe * tIm + qIm * tRe); // 21, into the other mode
      put(full, to + 4 + m, pRe * tRe - pIm * tIm, pRe * tIm + pIm * tRe); // 12, own mode
      put(full, to + 6 + 6 * mode, qRe * tRe - qIm * tIm, qRe * tIm + qIm * tRe); // 12, from the other mode
      const rRe = own[at + 6];
      const rIm = own[at + 7];
      const oRe = other[at + 6];
      const oIm = other[at + 7];
      put(
        full,
        to + 20 + m,
        p2Re * rRe - p2Im * rIm + q2Re * oRe - q2Im * oIm,
        p2Re * rIm + p2Im * rRe + q2Re * oIm + q2Im * oRe,
      );
      const sumRe = rRe + oRe;
      const sumIm = rIm + oIm;
      const pqRe = pRe * qRe - pIm * qIm;
      const pqIm = pRe * qIm + pIm * qRe;
      put(full, to + 22 + 6 * mode, pqRe * sumRe - pqIm * sumIm, pqRe * sumIm + pqIm * sumRe); // 22, other mode
      copyBlock(full, to + m, mode === 0 ? outD : outC, at);
    }
  }
  return { differential: outD, common: outC, full };
}

function put(out: Float64Array, at: number, re: number, im: number): void {
  out[at] = re;
  out[at + 1] = im;
}

/** One mode's own two-port out of the 32 numbers of a frequency, from its entry s11 on. */
function copyBlock(full: FourPort, from: number, out: TwoPort, at: number): void {
  for (let part = 0; part < 2; part++) {
    out[at + part] = full[from + part];
    out[at + 2 + part] = full[from + 4 + part];
    out[at + 4 + part] = full[from + 16 + part];
    out[at + 6 + part] = full[from + 20 + part];
  }
}
